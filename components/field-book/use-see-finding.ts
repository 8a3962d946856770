"use client";

import { useRef } from "react";
import { useBook } from "@/components/field-book/field-book-context";
import { fetchReadingAt } from "@/components/field-book/field-book-requests";
import { boundsOfGeometry } from "@/lib/map-state/geometry-bounds";
import { linesOfPlace, middleOfPlace } from "@/lib/map-state/place-lines";
import type { Finding } from "@/lib/schemas/logs";

/** Shows what a finding speaks of, everywhere: its row, its place on the map, and the pass it lies on unrolled. */
export function useSeeFinding(): (finding: Finding) => void {
  const { store, log, logVersion } = useBook();
  const latest = useRef(0);
  return ({ row, place }) => {
    const state = store.getState();
    const bounds = boundsOfGeometry(place);
    if (row != null && row !== state.row) state.chooseRow(row);
    state.showPlace(place);
    if (bounds) state.askToFrame(bounds);
    // On a page that scrolls, the map may be out of sight; where it is in sight, nothing moves.
    if (place)
      document
        .querySelector('[role="region"][aria-label="Map"]')
        ?.scrollIntoView({ block: "nearest", behavior: "smooth" });
    const middle = middleOfPlace(place);
    const turn = (latest.current += 1);
    // A row followed over the whole log lies on every pass: the one unrolled shows it already.
    if (!middle || linesOfPlace(place).length >= log.counts.passes) return;
    fetchReadingAt(logVersion.logId, middle.longitude, middle.latitude).then(
      ({ pass }) => {
        if (turn === latest.current) store.getState().choosePass(pass);
      },
      // Beside every pass: the map shows the place all the same.
      () => undefined,
    );
  };
}
