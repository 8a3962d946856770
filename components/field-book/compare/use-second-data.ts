"use client";

import { useMemo } from "react";
import { useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { useClasses, type Classes } from "@/components/field-book/use-classes";
import { useOverview, useTrack } from "@/components/field-book/use-log-data";

/**
 * What the second side shows, for components inside its book. The same reading of two logs is drawn in the classes of the
 * first, so that a colour means the same on both.
 */
export function useSecondData(firstClasses: Classes | null) {
  const logVersion = useLogVersion();
  const channel = useBookState((state) => state.channel);
  const pass = useBookState((state) => state.pass);
  const { data: overview } = useOverview(logVersion, channel);
  const { data: track } = useTrack(logVersion, channel, pass);
  const own = useClasses(channel, overview);
  const classes = useMemo(() => {
    if (!own || firstClasses?.context.channel !== channel) return own;
    return { ...own, edges: firstClasses.edges, colours: firstClasses.colours };
  }, [own, firstClasses, channel]);
  return { classes, unit: overview?.unit ?? "", track };
}
