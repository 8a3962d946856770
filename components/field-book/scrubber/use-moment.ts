"use client";

import { useQueryClient } from "@tanstack/react-query";
import { useCallback } from "react";
import { useBook, useLogVersion } from "@/components/field-book/field-book-context";
import { trackQuery } from "@/components/field-book/use-log-data";
import { passAtMoment, recordAtMoment, type WorkClock } from "@/lib/map-state/work-clock";

/** Shows everything as it was at a moment: the map until then, the pass under way unrolled, its reading named. */
export function useShowMoment(clock: WorkClock): (timeS: number) => void {
  const { store } = useBook();
  const logVersion = useLogVersion();
  const client = useQueryClient();
  return useCallback(
    (timeS) => {
      const { channel, row, cursor, setTime, choosePass, pointAt } = store.getState();
      const pass = passAtMoment(clock, timeS);
      setTime(timeS);
      if (pass === null) return;
      choosePass(pass);
      // A pass that is not here yet is on its way since it was chosen; the next moment names its reading.
      const track = client.getQueryData(trackQuery(logVersion, channel, pass).queryKey);
      const record = track ? recordAtMoment(track.timesS, timeS) : -1;
      pointAt(record < 0 ? null : { pass, record, row: row ?? cursor?.row ?? 1 });
    },
    [store, clock, client, logVersion],
  );
}
