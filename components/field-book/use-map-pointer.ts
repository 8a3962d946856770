"use client";

import { useQueryClient } from "@tanstack/react-query";
import type { LngLat, Map as MapLibreMap, MapMouseEvent } from "maplibre-gl";
import { useEffect } from "react";
import { useBook, useLogVersion } from "@/components/field-book/field-book-context";
import { findAtHand, findFarAway } from "@/components/field-book/find-reading";
import type { Cursor } from "@/lib/map-state/field-book-store";

/** How long the pointer must rest on a pass that is not here yet before it is asked for. */
const REST_MS = 120;

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
