import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { nameRecipeFile } from "@/lib/recipes/name-recipe-file";
import { RecipeFile, RecipeVersionQuery } from "@/lib/schemas/recipes";
import { exportRecipe } from "@/lib/server/recipes/read-recipes";

export const GET = withScope<"recipeId">("recipes.read", async ({ container, scope, params, url }) => {
  const file = await exportRecipe(container, scope, { ...params, ...parseQuery(RecipeVersionQuery, url) });
  return reply(RecipeFile, file, {
    headers: { "content-disposition": `attachment; filename="${nameRecipeFile(file)}"` },
  });
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
