"use client";

import { useRef, useState } from "react";
import type { RecipeActions } from "@/components/recipes/use-recipes";
import { Button } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { ApiProblem, describeFailure } from "@/lib/api/api-problem";

/** Longest file worth reading: a recipe of 20,000 columns is about 3 MB. */
const MOST_BYTES = 10_000_000;

/** The JSON in a file. @throws Error with words for the person */
async function readJson(file: File): Promise<unknown> {
  if (file.size > MOST_BYTES) throw new Error(`“${file.name}” is too large to be a recipe.`);
  try {
    return JSON.parse(await file.text());
  } catch {
    throw new Error(`“${file.name}” is no recipe: it cannot be read as JSON.`);
  }
}

type Places = NonNullable<ApiProblem["problem"]["errors"]>;

/** What says that a file is a recipe is not in it: a file of something else. */
function isForeign(places: Places): boolean {
  return places.some(({ path, column }) => !column && (!path || path === "kind"));
}

function refusalWords(failure: unknown, places: Places): string {
  if (places.length === 0) return describeFailure(failure);
  return isForeign(places) ? "This is not a recipe file of this program." : "This recipe cannot be used as it stands.";
}

/** Takes in a recipe that was exported here or elsewhere. What is wrong with it is said place by place. */
export function RecipeImport({ actions }: { actions: RecipeActions }) {
  const input = useRef<HTMLInputElement>(null);
  const [unread, setUnread] = useState<string | null>(null);
  const { takeIn } = actions;
  const take = async (file: File) => {
    setUnread(null);
    takeIn.reset();
    try {
      takeIn.mutate(await readJson(file));
    } catch (error) {
      setUnread(error instanceof Error ? error.message : describeFailure(error));
    }
  };
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
          if (file) void take(file);
          // The same file may be chosen again once it is mended.
          event.target.value = "";
        }}
      />
      <Button
        disabled={takeIn.isPending}
        onClick={() => {
          setUnread(null);
          takeIn.reset();
          input.current?.click();
        }}
      >
        {takeIn.isPending ? "Taking it in…" : "Take in a recipe file"}
      </Button>
      {unread ? (
        <Notice state="act" urgent title="Not taken in">
          {unread}
        </Notice>
      ) : null}
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
