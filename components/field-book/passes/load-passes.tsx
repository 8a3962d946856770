"use client";

import dynamic from "next/dynamic";

/** What stands in for a part that is on its way. */
function Waiting() {
  return <div className="hatch h-full min-h-40 opacity-60" role="status" aria-label="Comparing the passes" />;
}

/** Fetched when somebody asks for passes: most who open the book look at rows. */
export const PassesPanel = dynamic(
  () => import("@/components/field-book/passes/passes-panel").then((module) => module.PassesPanel),
  { ssr: false, loading: Waiting },
);

export const PassesTable = dynamic(
  () => import("@/components/field-book/passes/passes-table").then((module) => module.PassesTable),
  { ssr: false, loading: Waiting },
);
