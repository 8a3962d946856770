"use client";

import { useRef } from "react";
import { NoRecipeFile } from "@/components/recipes/read-recipe-file";
import type { RecipeActions } from "@/components/recipes/use-recipes";
import { Button } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { ApiProblem, describeFailure } from "@/lib/api/api-problem";

type Places = NonNullable<ApiProblem["problem"]["errors"]>;

/** What says that a file is a recipe is not in it: a file of something else. */
function isForeign(places: Places): boolean {
  return places.some(({ path, column }) => !column && (!path || path === "kind"));
}

function refusalWords(failure: unknown, places: Places): string {
  if (failure instanceof NoRecipeFile) return failure.message;
  if (places.length === 0) return describeFailure(failure);
  return isForeign(places) ? "This is not a recipe file of this program." : "This recipe cannot be used as it stands.";
}

/** Takes in a recipe that was exported here or elsewhere. What is wrong with it is said place by place. */
export function RecipeImport({ actions }: { actions: RecipeActions }) {
  const input = useRef<HTMLInputElement>(null);
  const { takeIn } = actions;
  const places = takeIn.error instanceof ApiProblem ? (takeIn.error.problem.errors ?? []) : [];
  return (
    <div className="space-y-3">
      <input
        ref={input}
        type="file"
        accept=".json,application/json"
        className="sr-only"
        aria-label="Recipe file"
        tabIndex={-1}
        onChange={(event) => {
          const file = event.target.files?.[0];
          if (file) takeIn.mutate(file);
          // The same file may be chosen again once it is mended.
          event.target.value = "";
        }}
      />
      <Button
        disabled={takeIn.isPending}
        onClick={() => {
          takeIn.reset();
          input.current?.click();
        }}
      >
        {takeIn.isPending ? "Taking it in…" : "Take in a recipe file"}
      </Button>
      {takeIn.error ? (
        <Notice state="act" urgent title="Not taken in">
          <p>{refusalWords(takeIn.error, places)}</p>
          {places.length > 0 ? (
            <details open={!isForeign(places)}>
              <summary className="min-h-11 text-slate underline md:min-h-6">Where it is not as it should be</summary>
              <ul className="list-disc break-words pl-5 text-table">
                {places.map((place) => (
                  <li key={`${place.path ?? place.column ?? ""} ${place.message}`}>
                    {place.column ? `Column “${place.column}”` : <code>{place.path}</code>}: {place.message}
                  </li>
                ))}
              </ul>
            </details>
          ) : null}
        </Notice>
      ) : null}
      {takeIn.data ? (
        <Notice state="fine">
          “{takeIn.data.name}” is here, as version {takeIn.data.version}. Files with its header are read with it from
          now on.
        </Notice>
      ) : null}
    </div>
  );
}
