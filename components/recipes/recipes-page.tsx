"use client";

import { useMemo, useState } from "react";
import { RecipeImport } from "@/components/recipes/recipe-import";
import { RecipeSheet } from "@/components/recipes/recipe-sheet";
import { RenameRecipe } from "@/components/recipes/rename-recipe";
import { sumUpRecipe } from "@/components/recipes/say-recipe";
import { recipeExportPath, useDeletedRecipes, useRecipeActions, useRecipes } from "@/components/recipes/use-recipes";
import { Button, buttonClass } from "@/components/ui/button";
import { DataTable, type DataColumn } from "@/components/ui/data-table";
import { EmptyState } from "@/components/ui/empty-state";
import { formatDay } from "@/components/ui/format-date";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { describeFailure } from "@/lib/api/api-problem";
import type { Recipe } from "@/lib/schemas/recipes";

function authorOf({ createdBy }: Recipe): string {
  return createdBy === null ? "the program" : (createdBy.name ?? "somebody who has left");
}

/** The organisation's recipes: what is known about the columns of files, so that nobody is asked twice. */
export function RecipesPage({ mayWrite }: { mayWrite: boolean }) {
  const recipes = useRecipes();
  const actions = useRecipeActions();
  const [opened, setOpened] = useState<Recipe | null>(null);
  if (recipes.isPending) return <Loading what="the recipes" />;
  if (recipes.isError) {
    return (
      <Notice state="act" urgent>
        {describeFailure(recipes.error)}
      </Notice>
    );
  }
  const { items } = recipes.data;
  return (
    <div className="space-y-6">
      {mayWrite ? <RecipeImport actions={actions} /> : null}
      <JustDeleted actions={actions} />
      {items.length === 0 ? (
        <EmptyState title="No recipe yet">
          <p>
            A recipe keeps what the columns of a file mean. Give it a name when you confirm the columns of a log, and
            the next file with the same columns is read without asking.
          </p>
        </EmptyState>
      ) : (
        <RecipeTable recipes={items} mayWrite={mayWrite} actions={actions} onOpen={setOpened} />
      )}
      {mayWrite ? <DeletedRecipes actions={actions} /> : null}
      <RecipeSheet recipe={opened} mayWrite={mayWrite} actions={actions} onClose={() => setOpened(null)} />
    </div>
  );
}

type Actions = ReturnType<typeof useRecipeActions>;

/** Right after a deletion: what happened, and the way back. */
function JustDeleted({ actions: { remove, restore } }: { actions: Actions }) {
  const failure = remove.error ?? restore.error;
  const gone = remove.isSuccess ? remove.variables : null;
  if (failure) {
    return (
      <Notice state="act" urgent title="Not done">
        {describeFailure(failure)}
      </Notice>
    );
  }
  if (!gone) return null;
  return (
    <Notice state="look" urgent>
      <p>
        “{gone.name}” was deleted: no file is read with it any more. Logs that were read with it do not change.{" "}
        <Button
          kind="quiet"
          disabled={restore.isPending}
          onClick={() => restore.mutate(gone, { onSuccess: () => remove.reset() })}
        >
          Undo
        </Button>
      </p>
    </Notice>
  );
}

interface RecipeTableProps {
  recipes: Recipe[];
  mayWrite: boolean;
  actions: Actions;
  onOpen: (recipe: Recipe) => void;
}

function RecipeTable({ recipes, mayWrite, actions, onOpen }: RecipeTableProps) {
  const columns = useMemo<DataColumn<Recipe>[]>(
    () => [
      {
        id: "name",
        header: "Recipe",
        value: (recipe) => recipe.name,
        cell: (recipe) => (
          <button
            type="button"
            onClick={() => onOpen(recipe)}
            className="inline-flex min-h-11 items-center text-left font-semibold text-slate underline underline-offset-3 [overflow-wrap:anywhere] md:min-h-8"
          >
            {recipe.name}
          </button>
        ),
      },
      { id: "columns", header: "What it reads", value: sumUpRecipe },
      { id: "version", header: "Version", numeric: true, value: (recipe) => recipe.version },
      { id: "author", header: "Saved by", value: authorOf },
      {
        id: "saved",
        header: "Saved",
        value: (recipe) => recipe.createdAt,
        cell: (recipe) => formatDay(recipe.createdAt),
      },
      {
        id: "used",
        header: "Last used",
        value: (recipe) => recipe.usedAt ?? undefined,
        cell: (recipe) => formatDay(recipe.usedAt) || "never",
      },
      { id: "logs", header: "Logs read", numeric: true, value: (recipe) => recipe.logCount },
    ],
    [onOpen],
  );
  return (
    <DataTable
      caption="Recipes of this organisation"
      rows={recipes}
      columns={columns}
      rowId={(recipe) => recipe.id}
      fileName="recipes"
      initialSort={{ id: "name", desc: false }}
      actions={(recipe) => (
        <>
          <a
            href={recipeExportPath(recipe.id)}
            download
            className={buttonClass("quiet")}
            aria-label={`Export ${recipe.name}`}
          >
            Export
          </a>
          {mayWrite ? (
            <>
              <RenameRecipe recipe={recipe} actions={actions} />
              <Button
                kind="quiet"
                aria-label={`Delete ${recipe.name}`}
                disabled={actions.remove.isPending}
                onClick={() => actions.remove.mutate(recipe)}
              >
                Delete
              </Button>
            </>
          ) : null}
        </>
      )}
    />
  );
}

/** Folded away: recipes that were deleted, each of which can come back. */
function DeletedRecipes({ actions }: { actions: Actions }) {
  const deleted = useDeletedRecipes();
  const items = deleted.data?.items ?? [];
  if (items.length === 0) return null;
  return (
    <details>
      <summary className="inline-flex min-h-11 items-center text-slate md:min-h-8">
        Deleted recipes ({items.length})
      </summary>
      <ul className="max-w-xl border-t border-rule">
        {items.map((recipe) => (
          <li key={recipe.id} className="flex items-center justify-between gap-4 border-b border-rule py-1">
            <span className="min-w-0 [overflow-wrap:anywhere]">
              {recipe.name} <span className="text-table text-ink-soft">deleted on {formatDay(recipe.deletedAt)}</span>
            </span>
            <Button
              kind="quiet"
              disabled={actions.restore.isPending}
              aria-label={`Restore ${recipe.name}`}
              onClick={() => actions.restore.mutate(recipe, { onSuccess: () => actions.remove.reset() })}
            >
              Restore
            </Button>
          </li>
        ))}
      </ul>
    </details>
  );
}
