"use client";

import { useQueryClient } from "@tanstack/react-query";
import { useEffect } from "react";
import { useBook, useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { logVersionKey, trackQuery, usePasses } from "@/components/field-book/use-log-data";
import { passesNearby } from "@/lib/map-state/passes-nearby";

/** Readings of a channel kept in memory, so that pointing and stepping ask nobody: 16 MB at a desk, a few passes on a phone. */
const MOST_READINGS = { wide: 4_000_000, narrow: 200_000 };

/** Who looks through channels one after the other is not followed. */
const REST_MS = 1_000;

/** Fetches the passes of the shown channel one after the other while nothing else is going on, those beside the chosen one first. */
export function useTracksAtHand(isWide: boolean): void {
  const client = useQueryClient();
  const { store, log } = useBook();
  const logVersion = useLogVersion();
  const channel = useBookState((state) => state.channel);
  const { data: passes } = usePasses(logVersion);
  const rows = log.counts.rows;
  useEffect(() => {
    if (!passes || savesData()) return;
    let isGone = false;
    const fetchAll = async () => {
      await new Promise((resolve) => setTimeout(resolve, REST_MS));
      // One channel at a time, else looking through all of them would fill the memory.
      const isOther = ({ queryKey }: { queryKey: readonly unknown[] }) => !queryKey.includes(channel);
      if (!isGone)
        client.removeQueries({ queryKey: logVersionKey(logVersion, "track"), type: "inactive", predicate: isOther });
      const mostRecords = MOST_READINGS[isWide ? "wide" : "narrow"] / rows;
      for (const pass of passesNearby(passes, store.getState().pass, mostRecords)) {
        await untilQuiet();
        if (isGone) return;
        await client.prefetchQuery(trackQuery(logVersion, channel, pass));
      }
    };
    void fetchAll();
    return () => {
      isGone = true;
    };
  }, [client, store, logVersion, channel, passes, rows, isWide]);
}

/** Whether the person asked their browser to go easy on the connection. */
function savesData(): boolean {
  return (navigator as { connection?: { saveData?: boolean } }).connection?.saveData === true;
}

/** Long enough for what a click asks for to go first, where the browser does not tell when it is idle. */
const QUIET_MS = 150;

function untilQuiet(): Promise<void> {
  return new Promise((resolve) => {
    if (typeof requestIdleCallback === "function") requestIdleCallback(() => resolve(), { timeout: 2_000 });
    else setTimeout(resolve, QUIET_MS);
  });
}
