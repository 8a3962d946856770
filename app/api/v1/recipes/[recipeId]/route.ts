import { parseBody, parseQuery } from "@/app/_server/parse-body";
import { reply, replyNothing } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Recipe, RecipeDetail, RecipePatch, RecipeVersionQuery } from "@/lib/schemas/recipes";
import { deleteRecipe, updateRecipe } from "@/lib/server/recipes/change-recipes";
import { readRecipe } from "@/lib/server/recipes/read-recipes";

export const GET = withScope<"recipeId">("recipes.read", async ({ container, scope, params, url }) =>
  reply(RecipeDetail, await readRecipe(container, scope, { ...params, ...parseQuery(RecipeVersionQuery, url) })),
);

export const PATCH = withScope<"recipeId">("recipes.write", async ({ container, scope, params, request }) => {
  const patch = await parseBody(RecipePatch, request);
  return reply(Recipe, await updateRecipe(container, scope, { recipeId: params.recipeId, patch }));
});

export const DELETE = withScope<"recipeId">("recipes.write", async ({ container, scope, params }) => {
  await deleteRecipe(container, scope, params.recipeId);
  return replyNothing();
});

export { refuseMethod as POST, refuseMethod as PUT } from "@/app/_server/refuse-method";
