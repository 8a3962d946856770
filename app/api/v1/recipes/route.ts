import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { RecipeList } from "@/lib/schemas/recipes";
import { listRecipes } from "@/lib/server/recipes/read-recipes";

export const GET = withScope("recipes.read", async ({ container, scope }) =>
  reply(RecipeList, await listRecipes(container, scope)),
);

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
