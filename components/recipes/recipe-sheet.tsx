"use client";

import { sayRecipeColumns, sayRecipeExtras, sayRecipeFile } from "@/components/recipes/say-recipe";
import { recipeExportPath, useRecipe, type RecipeActions } from "@/components/recipes/use-recipes";
import { Button, buttonClass } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { formatMoment } from "@/components/ui/format-date";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { describeFailure } from "@/lib/api/api-problem";
import type { Recipe, RecipeDetail, RecipeVersion } from "@/lib/schemas/recipes";

export interface RecipeSheetProps {
  /** Null: shut. */
  recipe: Recipe | null;
  mayWrite: boolean;
  actions: RecipeActions;
  onClose: () => void;
}

/** Everything one recipe says, and its earlier versions. */
export function RecipeSheet({ recipe, mayWrite, actions, onClose }: RecipeSheetProps) {
  const detail = useRecipe(recipe?.id ?? null);
  return (
    <Dialog
      title={recipe?.name ?? ""}
      description={recipe ? sayRecipeFile(recipe) : undefined}
      open={recipe !== null}
      onOpenChange={(open) => (open ? undefined : onClose())}
    >
      {detail.isPending ? <Loading what="the recipe" /> : null}
      {detail.isError || actions.change.error ? (
        <Notice state="act" urgent>
          {describeFailure(detail.error ?? actions.change.error)}
        </Notice>
      ) : null}
      {detail.data ? <SheetBody recipe={detail.data} mayWrite={mayWrite} actions={actions} /> : null}
    </Dialog>
  );
}

function SheetBody({ recipe, mayWrite, actions }: { recipe: RecipeDetail; mayWrite: boolean; actions: RecipeActions }) {
  return (
    <div className="space-y-5">
      <section aria-labelledby="recipe-columns-title" className="space-y-2">
        <h3 id="recipe-columns-title">What the columns are taken for</h3>
        <dl className="space-y-1 text-table">
          {sayRecipeColumns(recipe).map(({ names, meaning }) => (
            <div key={names} className="grid grid-cols-[minmax(0,2fr)_minmax(0,3fr)] gap-3 border-b border-rule py-1">
              <dt className="break-words [overflow-wrap:anywhere]">{names}</dt>
              <dd className="break-words text-ink-soft">{meaning}</dd>
            </div>
          ))}
        </dl>
        {sayRecipeExtras(recipe).map((words) => (
          <p key={words} className="text-table">
            {words}
          </p>
        ))}
        <p className="text-table text-ink-soft">
          Fits files whose header has{" "}
          {recipe.columnNames.length === 1 ? "this one column" : `these ${recipe.columnNames.length} columns`}, in this
          order.
        </p>
      </section>
      <section aria-labelledby="recipe-versions-title" className="space-y-2">
        <h3 id="recipe-versions-title">Versions</h3>
        <ol className="border-t border-rule">
          {recipe.versions.map((version) => (
            <li
              key={version.version}
              className="flex flex-wrap items-center justify-between gap-2 border-b border-rule py-2"
            >
              <VersionWords version={version} isNewest={version.version === recipe.version} />
              <span className="flex flex-wrap gap-1">
                <a href={recipeExportPath(recipe.id, version.version)} download className={buttonClass("quiet")}>
                  Export
                  <span className="sr-only"> version {version.version}</span>
                </a>
                {mayWrite && version.version !== recipe.version ? (
                  <Button
                    kind="quiet"
                    disabled={actions.change.isPending}
                    aria-label={`Use version ${version.version} again`}
                    onClick={() => actions.change.mutate({ id: recipe.id, patch: { useVersion: version.version } })}
                  >
                    Use again
                  </Button>
                ) : null}
              </span>
            </li>
          ))}
        </ol>
      </section>
    </div>
  );
}

function VersionWords({ version, isNewest }: { version: RecipeVersion; isNewest: boolean }) {
  const { createdBy, createdAt, note } = version;
  return (
    <div className="min-w-0 flex-1 basis-48">
      <p>
        <span className="tabular font-semibold">Version {version.version}</span>
        {isNewest ? <span className="text-ink-soft">, in use</span> : null}
        {note ? <span className="break-words text-ink-soft">: {note}</span> : null}
      </p>
      <p className="text-table text-ink-soft">
        {formatMoment(createdAt)} · {createdBy === null ? "the program" : (createdBy.name ?? "somebody who has left")}
      </p>
    </div>
  );
}
