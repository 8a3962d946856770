import { parseBody, parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Recipe, RecipeInput, RecipeList, RecipeListQuery } from "@/lib/schemas/recipes";
import { createRecipe } from "@/lib/server/recipes/change-recipes";
import { listRecipes } from "@/lib/server/recipes/read-recipes";

export const GET = withScope("recipes.read", async ({ container, scope, url }) =>
  reply(RecipeList, await listRecipes(container, scope, parseQuery(RecipeListQuery, url))),
);

export const POST = withScope("recipes.write", async ({ container, scope, request }) => {
  const recipe = await createRecipe(container, scope, await parseBody(RecipeInput, request));
  return reply(Recipe, recipe, { status: 201, headers: { location: `/api/v1/recipes/${recipe.id}` } });
});

export { refuseMethod as PUT, refuseMethod as PATCH, refuseMethod as DELETE } from "@/app/_server/refuse-method";
