"use client";

import { useMemo } from "react";
import { useBookState } from "@/components/field-book/field-book-context";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import { useGreyInk } from "@/components/pictures/grey-ink";
import { classOf } from "@/lib/legend/class-edges";
import { presetsFor, proposeEdges, type EdgeContext } from "@/lib/legend/propose-edges";
import { classColours, isDiverging, rampOf } from "@/lib/legend/ramps";
import type { LogOverview } from "@/lib/schemas/logs";

export interface Classes {
  /** Inner edges, rising, in SI. */
  edges: number[];
  /** One colour more than edges. */
  colours: string[];
  context: EdgeContext;
}

/** The classes a channel is drawn in: the person's own edges, else the default for the channel. Null until the log is summed up. */
export function useClasses(channel: string, overview: LogOverview | undefined): Classes | null {
  const own = useBookState((state) => state.edges[channel]);
  const { factor } = useChannelUnits(overview?.unit ?? "", channel);
  const isGrey = useGreyInk();
  return useMemo(() => {
    if (!overview || overview.channel !== channel) return null;
    const { histogram, distribution, targetMarginN, marginDeadbandN } = overview;
    const context: EdgeContext = {
      channel,
      histogram,
      distribution,
      targetMarginN,
      marginDeadbandN,
      shownFactor: factor,
    };
    const edges = own ?? proposeEdges(presetsFor(context)[0] ?? "round", context);
    const colours = isGrey ? classColours("Greys", edges.length + 1) : coloursFor(context, edges);
    return { edges, colours, context };
  }, [channel, overview, own, factor, isGrey]);
}

/** A diverging ramp keeps its pale middle at the target, or at 0 for differences. */
function coloursFor({ channel, targetMarginN }: EdgeContext, edges: readonly number[]): string[] {
  const ramp = rampOf(channel);
  const middle = channel === "margin" ? targetMarginN : 0;
  const pivot = isDiverging(ramp) && middle !== null ? classOf(middle, edges) : undefined;
  return classColours(ramp, edges.length + 1, pivot);
}
