import { parseBody } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Recipe, RecipeFile } from "@/lib/schemas/recipes";
import { createRecipe } from "@/lib/server/recipes/change-recipes";

export const POST = withScope("recipes.write", async ({ container, scope, request }) => {
  const file = await parseBody(RecipeFile, request);
  const recipe = await createRecipe(container, scope, file, "recipe.import");
  return reply(Recipe, recipe, { status: 201, headers: { location: `/api/v1/recipes/${recipe.id}` } });
});

export {
  refuseMethod as GET,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
