"use client";

import { useQueryClient, type QueryClient } from "@tanstack/react-query";
import { useEffect } from "react";
import type { Book } from "@/components/field-book/field-book-context";
import { findAtHand, findFarAway, type Finder, type LngLatPlace } from "@/components/field-book/find-reading";
import { trackQuery } from "@/components/field-book/use-log-data";
import type { Cursor } from "@/lib/map-state/field-book-store";
import { middleOfCell } from "@/lib/map-state/pass-cells";

function finderOf(client: QueryClient, { logVersion, store }: Book): Finder {
  return { client, store, log: { ...logVersion, cleaned: store.getState().cleaned } };
}

/** Where the reading pointed at lies, if its pass is in memory. */
function placeOf({ client, log, store }: Finder, { pass, record, row }: Cursor): LngLatPlace | null {
  const track = client.getQueryData(trackQuery(log, store.getState().channel, pass).queryKey);
  if (!track || record >= track.records) return null;
  const [lng, lat] = middleOfCell(track, record, row);
  return { lng, lat };
}

/**
 * Two logs of one field share no pass numbers: what is pointed at in one is pointed at in the other by its place on the
 * ground, and the second unrolls the pass that lies under the middle of the first's. Does nothing for one and the same log.
 */
export function usePlacesAcrossLogs(first: Book, second: Book | null): void {
  const client = useQueryClient();
  useEffect(() => {
    if (!second || second.log.id === first.log.id) return;
    let isLed = false;
    const lead = (from: Book, to: Book) =>
      from.store.subscribe(({ cursor }, before) => {
        if (isLed || cursor === before.cursor) return;
        const place = cursor && placeOf(finderOf(client, from), cursor);
        isLed = true;
        to.store.getState().pointAt(place ? findAtHand(finderOf(client, to), place) : null);
        isLed = false;
      });
    let latest = 0;
    const unrollBelow = () => {
      const turn = (latest += 1);
      void passBelow(client, first, second).then((pass) => {
        if (pass !== null && turn === latest) second.store.getState().choosePass(pass);
      });
    };
    unrollBelow();
    const stops = [
      lead(first, second),
      lead(second, first),
      first.store.subscribe(({ pass }, before) => {
        if (pass !== before.pass) unrollBelow();
      }),
    ];
    return () => {
      latest += 1;
      stops.forEach((stop) => stop());
    };
  }, [client, first, second]);
}

/** The pass of the second log under the middle of the first's; null where it worked other ground. */
async function passBelow(client: QueryClient, first: Book, second: Book): Promise<number | null> {
  const { log, store } = finderOf(client, first);
  const { channel, pass } = store.getState();
  if (pass === null) return null;
  try {
    const track = await client.ensureQueryData(trackQuery(log, channel, pass));
    const [lng, lat] = middleOfCell(track, track.records >> 1, (track.rows >> 1) + 1);
    return (await findFarAway(finderOf(client, second), { lng, lat }))?.pass ?? null;
  } catch {
    // Bare ground answers 404.
    return null;
  }
}
