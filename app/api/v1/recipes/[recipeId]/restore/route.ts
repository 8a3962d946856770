import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { Recipe } from "@/lib/schemas/recipes";
import { restoreRecipe } from "@/lib/server/recipes/change-recipes";

export const POST = withScope<"recipeId">("recipes.write", async ({ container, scope, params }) =>
  reply(Recipe, await restoreRecipe(container, scope, params.recipeId)),
);

export {
  refuseMethod as GET,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
