"use client";

import { useMemo } from "react";
import { useBookState } from "@/components/field-book/field-book-context";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import { useOurLegend } from "@/components/field-book/use-legends";
import { categoriesOf, categoryEdges, type Category } from "@/lib/legend/categories";
import { classOf } from "@/lib/legend/class-edges";
import { nameEdges, type EdgesInUse } from "@/lib/legend/name-edges";
import { presetsFor, proposeEdges, type EdgeContext } from "@/lib/legend/propose-edges";
import { classColours, isDiverging, rampOf } from "@/lib/legend/ramps";
import type { LogOverview } from "@/lib/schemas/logs";

export interface Classes {
  /** Inner edges, rising, in SI. */
  edges: number[];
  /** One colour more than edges. */
  colours: string[];
  context: EdgeContext;
  /** What each class is called, where readings are names and not amounts. */
  categories?: readonly Category[] | null;
  /** Where the edges come from. */
  inUse?: EdgesInUse;
}

/**
 * The classes a channel is drawn in: those of its names; else the person's own edges, else those of the organisation, else the
 * default for the channel. Null until the log is summed up.
 */
export function useClasses(channel: string, overview: LogOverview | undefined): Classes | null {
  const own = useBookState((state) => state.edges[channel]);
  const ours = useOurLegend(channel, overview?.unit ?? "")?.edges;
  const { factor } = useChannelUnits(overview?.unit ?? "", channel);
  return useMemo(() => {
    if (!overview || overview.channel !== channel) return null;
    const { histogram, distribution, targetMarginN, marginDeadbandN } = overview;
    const settings = { targetMarginN, marginDeadbandN };
    const context: EdgeContext = { channel, histogram, distribution, ...settings, shownFactor: factor };
    const categories = categoriesOf(channel);
    if (categories) {
      const colours = categories.map(({ colour }) => colour);
      return { edges: categoryEdges(categories), colours, context, categories };
    }
    const edges = own ?? ours ?? proposeEdges(presetsFor(context)[0] ?? "round", context);
    return { edges, colours: coloursFor(context, edges), context, inUse: nameEdges({ own, ours, context }) };
  }, [channel, overview, own, ours, factor]);
}

/** A diverging ramp keeps its pale middle at the target, or at 0 for differences. */
function coloursFor({ channel, targetMarginN }: EdgeContext, edges: readonly number[]): string[] {
  const ramp = rampOf(channel);
  const middle = channel === "margin" ? targetMarginN : 0;
  const pivot = isDiverging(ramp) && middle !== null ? classOf(middle, edges) : undefined;
  return classColours(ramp, edges.length + 1, pivot);
}
