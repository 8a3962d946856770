import { replyNothing } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { deleteRecipe } from "@/lib/server/recipes/read-recipes";

export const DELETE = withScope<"recipeId">("logs.map", async ({ container, scope, params }) => {
  await deleteRecipe(container, scope, params.recipeId);
  return replyNothing();
});

export {
  refuseMethod as GET,
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
} from "@/app/_server/refuse-method";
