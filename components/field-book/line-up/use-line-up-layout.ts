"use client";

import { useMemo } from "react";
import { useBook, useLogVersion } from "@/components/field-book/field-book-context";
import type { ShareStrip } from "@/components/field-book/line-up/line-up-plot";
import { useRowStatistics } from "@/components/field-book/use-log-data";
import { useMachines } from "@/components/hooks/use-machines";
import { toolbarLayout, type ToolbarLayout } from "@/lib/rows/toolbar-layout";
import type { RowStatisticsBody } from "@/lib/schemas/logs";

/** How the rows of the open log stand on its machine. */
export function useToolbarLayout(rows: number): ToolbarLayout {
  const { log } = useBook();
  const { data: machines } = useMachines(log.machineId !== null);
  return useMemo(() => {
    const machine = machines?.items.find(({ id }) => id === log.machineId);
    return toolbarLayout(rows, machine?.kind === "seeder" ? machine : null);
  }, [machines, log.machineId, rows]);
}

type ShareField = "shareUnderTarget" | "shareAtLimit" | "shareContactLost";

function stripOf(
  body: RowStatisticsBody | undefined,
  field: ShareField,
  words: Omit<ShareStrip, "values">,
): ShareStrip[] {
  const values = body?.items.map((item) => item[field]) ?? [];
  return values.some((value) => value !== null) ? [{ ...words, values }] : [];
}

/**
 * Under target (of the margin) and at the limit (of the force) beside any channel, where the log carries them: what a row suffers
 * is read together with what the channel shows.
 */
export function useShareStrips(statistics: RowStatisticsBody): ShareStrip[] {
  const { log } = useBook();
  const version = useLogVersion();
  const has = (id: string) => log.channels.some((channel) => channel.id === id && channel.perRow);
  const margin = useRowStatistics(version, "margin", has("margin")).data;
  const downforce = useRowStatistics(version, "downforce", has("downforce")).data;
  return useMemo(() => {
    const rows = statistics.items.length;
    const known = [
      ...stripOf(margin, "shareUnderTarget", { id: "under-target", short: "under", words: "under target" }),
      ...stripOf(downforce, "shareAtLimit", { id: "at-limit", short: "at limit", words: "at the limit" }),
    ].filter((strip) => strip.values.length === rows);
    if (known.length > 0) return known;
    return stripOf(statistics, "shareContactLost", { id: "contact-lost", short: "lost", words: "without contact" });
  }, [statistics, margin, downforce]);
}
