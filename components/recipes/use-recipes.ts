"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import { readRecipeFile } from "@/components/recipes/read-recipe-file";
import { requestJson, requestNothing } from "@/lib/api/request-json";
import { Recipe, RecipeDetail, RecipeList, type RecipePatch } from "@/lib/schemas/recipes";

const ROOT = "/api/v1/recipes";
const KEY = ["recipes"] as const;

export const recipeExportPath = (recipeId: string, version?: number) =>
  `${ROOT}/${recipeId}/export${version === undefined ? "" : `?version=${version}`}`;

export function useRecipes() {
  return useQuery({ queryKey: [...KEY, "list"], queryFn: () => requestJson(RecipeList, ROOT) });
}

/** Those that were deleted and can be restored. */
export function useDeletedRecipes() {
  return useQuery({ queryKey: [...KEY, "deleted"], queryFn: () => requestJson(RecipeList, `${ROOT}?deleted=1`) });
}

/** One recipe with all of its versions; null: none asked for. */
export function useRecipe(recipeId: string | null) {
  return useQuery({
    queryKey: [...KEY, "one", recipeId],
    queryFn: () => requestJson(RecipeDetail, `${ROOT}/${recipeId ?? ""}`),
    enabled: recipeId !== null,
  });
}

/** What can be done to recipes; each asks for all of them again. */
export function useRecipeActions() {
  const client = useQueryClient();
  const onSettled = () => client.invalidateQueries({ queryKey: KEY });
  const takeIn = useMutation({
    mutationFn: async (file: File) => {
      const body = await readRecipeFile(file);
      return requestJson(Recipe, `${ROOT}/import`, { method: "POST", body, idempotencyKey: crypto.randomUUID() });
    },
    onSettled,
  });
  /** What was said of a file that was taken in, or not, goes with the next action. */
  const onMutate = () => takeIn.reset();
  return {
    change: useMutation({
      onMutate,
      mutationFn: ({ id, patch }: { id: string; patch: z.input<typeof RecipePatch> }) =>
        requestJson(Recipe, `${ROOT}/${id}`, { method: "PATCH", body: patch }),
      onSettled,
    }),
    remove: useMutation({
      onMutate,
      mutationFn: (recipe: Recipe) => requestNothing(`${ROOT}/${recipe.id}`, { method: "DELETE" }),
      onSettled,
    }),
    restore: useMutation({
      onMutate,
      mutationFn: (recipe: Recipe) => requestJson(Recipe, `${ROOT}/${recipe.id}/restore`, { method: "POST" }),
      onSettled,
    }),
    takeIn,
  };
}

export type RecipeActions = ReturnType<typeof useRecipeActions>;
