import type { Operation } from "@/lib/openapi/operation";
import {
  Recipe,
  RecipeDetail,
  RecipeFile,
  RecipeInput,
  RecipeList,
  RecipeListQuery,
  RecipePatch,
  RecipeVersionQuery,
} from "@/lib/schemas/recipes";

const tag = "Recipes";

/** Saved meanings of columns: shared in the organisation, versioned, and able to travel. */
export const recipeOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/recipes",
    tag,
    permission: "recipes.read",
    summary: "Saved meanings of columns, the last changed first",
    query: RecipeListQuery,
    replies: [{ status: 200, description: "Recipes with their newest version", schema: RecipeList }],
  },
  {
    method: "POST",
    path: "/api/v1/recipes",
    tag,
    permission: "recipes.write",
    summary: "Keep a recipe",
    description: "Under a name that is there already it becomes the next version; earlier versions stay as they were.",
    body: RecipeInput,
    replies: [{ status: 201, description: "The recipe at its new version", schema: Recipe }],
  },
  {
    method: "POST",
    path: "/api/v1/recipes/import",
    tag,
    permission: "recipes.write",
    summary: "Take in a recipe that was exported",
    description:
      "Each fault is answered with its path. Under a name that is there already it becomes the next version.",
    body: RecipeFile,
    replies: [{ status: 201, description: "The recipe at its new version", schema: Recipe }],
  },
  {
    method: "GET",
    path: "/api/v1/recipes/{recipeId}",
    tag,
    permission: "recipes.read",
    summary: "A recipe with all of its versions",
    query: RecipeVersionQuery,
    replies: [{ status: 200, description: "The recipe, at `version` or its newest", schema: RecipeDetail }],
  },
  {
    method: "PATCH",
    path: "/api/v1/recipes/{recipeId}",
    tag,
    permission: "recipes.write",
    summary: "Rename a recipe, or use an earlier version again",
    body: RecipePatch,
    replies: [{ status: 200, description: "The recipe as it is now", schema: Recipe }],
    errors: ["conflict"],
  },
  {
    method: "DELETE",
    path: "/api/v1/recipes/{recipeId}",
    tag,
    permission: "recipes.write",
    summary: "Take a recipe out of use",
    description: "No file is read with it any more; logs that were keep naming it, and it can be restored.",
    replies: [{ status: 204, description: "Gone" }],
  },
  {
    method: "POST",
    path: "/api/v1/recipes/{recipeId}/restore",
    tag,
    permission: "recipes.write",
    summary: "Undo the deletion of a recipe",
    replies: [{ status: 200, description: "The recipe", schema: Recipe }],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/recipes/{recipeId}/export",
    tag,
    permission: "recipes.read",
    summary: "A recipe as a file that travels",
    query: RecipeVersionQuery,
    replies: [{ status: 200, description: "The recipe, for `POST /recipes/import`", schema: RecipeFile }],
  },
];
