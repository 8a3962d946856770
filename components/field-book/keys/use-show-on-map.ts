"use client";

import { useQueryClient } from "@tanstack/react-query";
import { useBook, useLogVersion } from "@/components/field-book/field-book-context";
import { trackQuery } from "@/components/field-book/use-log-data";
import { boundsOfPositions, stretchRing } from "@/lib/map-state/pass-cells";
import { recordAtDistance } from "@/lib/map-state/pass-track";

/** Has the map show the brushed stretch, or else the whole pass that is unrolled. */
export function useShowOnMap(): () => void {
  const { store } = useBook();
  const logVersion = useLogVersion();
  const client = useQueryClient();
  return () => {
    const { channel, pass, stretch, askToFrame } = store.getState();
    const track = pass === null ? undefined : client.getQueryData(trackQuery(logVersion, channel, pass).queryKey);
    if (!track || track.records === 0) return;
    const span = stretch?.pass === pass ? stretch : { fromM: 0, toM: track.lengthM };
    const [from, to] = [recordAtDistance(track, span.fromM), recordAtDistance(track, span.toM)];
    askToFrame(boundsOfPositions(stretchRing(track, null, from, to)));
  };
}
