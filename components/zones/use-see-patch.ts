"use client";

import { useBook } from "@/components/field-book/field-book-context";
import { unwrapBounds } from "@/lib/map-state/geometry-bounds";
import type { ZonePatch } from "@/lib/schemas/limit-zones";

/** A little inside the end of a stretch, so that the cell after it is not taken in. */
const INSIDE_M = 0.01;

/** Shows a patch everywhere: the map frames it, its pass is unrolled with the stretch brushed, a single row is lit. */
export function useSeePatch(): (patch: ZonePatch) => void {
  const { store } = useBook();
  return ({ pass, firstRow, lastRow, fromM, toM, bbox }) => {
    const state = store.getState();
    state.choosePass(pass);
    state.brush({ pass, fromM, toM: Math.max(fromM, toM - INSIDE_M) });
    if (firstRow === lastRow && state.row !== firstRow) state.chooseRow(firstRow);
    state.askToFrame(unwrapBounds(bbox));
  };
}
