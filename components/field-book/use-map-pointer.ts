"use client";

import { useQueryClient, type QueryClient } from "@tanstack/react-query";
import type { LngLat, Map as MapLibreMap, MapMouseEvent } from "maplibre-gl";
import { useEffect } from "react";
import { useBook, useLogVersion } from "@/components/field-book/field-book-context";
import { fetchReadingAt } from "@/components/field-book/field-book-requests";
import { logVersionKey, trackQuery, type LogVersion } from "@/components/field-book/use-log-data";
import type { Cursor, FieldBookStore } from "@/lib/map-state/field-book-store";
import { locateInPass } from "@/lib/map-state/pass-cells";
import type { PassTrack } from "@/lib/map-state/pass-track";

/** How long the pointer must rest on a pass that is not here yet before it is asked for. */
const REST_MS = 120;

interface Finder {
  client: QueryClient;
  log: LogVersion;
  store: FieldBookStore;
}

/** Passes of the shown channel that are in memory; the chosen one first. */
function tracksAtHand({ client, log, store }: Finder): PassTrack[] {
  const { channel, pass } = store.getState();
  const queries = client.getQueriesData<PassTrack>({
    queryKey: logVersionKey(log, "track", channel),
  });
  return queries
    .flatMap(([, track]) => (track ? [track] : []))
    .sort((a, b) => Number(b.pass === pass) - Number(a.pass === pass));
}

function findAtHand(finder: Finder, { lng, lat }: LngLat): Cursor | null {
  for (const track of tracksAtHand(finder)) {
    const found = locateInPass(track, lng, lat);
    if (found) return { pass: track.pass, ...found };
  }
  return null;
}

/** Asks the server which pass lies under a place and fetches that pass, so that the next look finds it at hand. */
async function findFarAway(finder: Finder, place: LngLat): Promise<Cursor | null> {
  const { pass } = await fetchReadingAt(finder.log.logId, place.lng, place.lat);
  const track = await finder.client.ensureQueryData(trackQuery(finder.log, finder.store.getState().channel, pass));
  const found = locateInPass(track, place.lng, place.lat);
  return found ? { pass, ...found } : null;
}

/** Pointing names a reading, from memory where its pass is loaded; a click unrolls the pass there. */
export function useMapPointer(map: MapLibreMap | null): void {
  const { store } = useBook();
  const logVersion = useLogVersion();
  const client = useQueryClient();
  useEffect(() => {
    if (!map) return;
    const finder = { client, log: logVersion, store };
    let resting: ReturnType<typeof setTimeout> | undefined;
    let latest = 0;
    const look = (place: LngLat, onFound: (cursor: Cursor | null) => void) => {
      clearTimeout(resting);
      const turn = (latest += 1);
      const atHand = findAtHand(finder, place);
      if (atHand) return onFound(atHand);
      resting = setTimeout(() => {
        findFarAway(finder, place)
          // Bare ground answers 404: there is simply nothing to name.
          .catch(() => null)
          .then((cursor) => turn === latest && onFound(cursor));
      }, REST_MS);
    };
    const onMove = ({ lngLat }: MapMouseEvent) => {
      const { pointAt } = store.getState();
      if (!findAtHand(finder, lngLat)) pointAt(null);
      look(lngLat, pointAt);
    };
    const onOut = () => {
      clearTimeout(resting);
      latest += 1;
      store.getState().pointAt(null);
    };
    // A click is a choice: moving on before the answer is here must not undo it. Only a later click does.
    let latestClick = 0;
    const onClick = ({ lngLat }: MapMouseEvent) => {
      const turn = (latestClick += 1);
      const atHand = findAtHand(finder, lngLat);
      const found = atHand ? Promise.resolve(atHand) : findFarAway(finder, lngLat).catch(() => null);
      void found.then((cursor) => {
        if (!cursor || turn !== latestClick) return;
        store.getState().choosePass(cursor.pass);
        store.getState().pointAt(cursor);
      });
    };
    map.getCanvas().style.cursor = "crosshair";
    map.on("mousemove", onMove);
    map.on("mouseout", onOut);
    map.on("click", onClick);
    return () => {
      clearTimeout(resting);
      latestClick += 1;
      map.off("mousemove", onMove);
      map.off("mouseout", onOut);
      map.off("click", onClick);
    };
  }, [map, client, logVersion, store]);
}
