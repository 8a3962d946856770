"use client";

import Link from "next/link";
import { useColumns } from "@/components/hooks/use-logs";
import type { Log } from "@/lib/schemas/logs";

export interface RecipeWordsProps {
  log: Pick<Log, "id" | "mappingId">;
  /** Where the meanings of the columns are changed; null for those who may not. */
  columnsHref: string | null;
}

/** Says which recipe told what the columns mean, where no person was asked. */
export function RecipeWords({ log, columnsHref }: RecipeWordsProps) {
  if (log.mappingId === null) return null;
  return <NamedRecipe logId={log.id} columnsHref={columnsHref} />;
}

function NamedRecipe({ logId, columnsHref }: { logId: string; columnsHref: string | null }) {
  const recipe = useColumns(logId).data?.recipe;
  if (!recipe) return null;
  return (
    <p className="text-ink-soft">
      Read with the recipe “{recipe.name}”, version {recipe.version}.{" "}
      {columnsHref === null ? null : (
        <Link href={columnsHref} className="inline-flex min-h-11 items-center text-slate underline md:min-h-6">
          Change what the columns mean
        </Link>
      )}
    </p>
  );
}
