"use client";

import { useRef, type PointerEvent } from "react";
import { useBook } from "@/components/field-book/field-book-context";
import { readingAt, type PassScale } from "@/components/field-book/pass-scale";
import { boundsOfPositions, stretchRing } from "@/lib/map-state/pass-cells";
import { recordAtDistance, type PassTrack } from "@/lib/map-state/pass-track";

/** A press that moves less than this is a click, not a brush. */
const CLICK_PX = 5;

/** Pointing, choosing a row by a click, and brushing a stretch (which the map then frames). */
export function usePassPointer(track: PassTrack | undefined, scale: PassScale) {
  const { store } = useBook();
  const start = useRef<{ x: number; y: number; distanceM: number } | null>(null);
  const find = (event: PointerEvent<HTMLElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    const point = { x: event.clientX - box.left, y: event.clientY - box.top };
    return track && scale.width > 0 ? { point, ...readingAt(scale, track, point) } : null;
  };
  const movedFar = (point: { x: number; y: number }) =>
    start.current !== null && Math.hypot(point.x - start.current.x, point.y - start.current.y) >= CLICK_PX;
  return {
    onPointerDown: (event: PointerEvent<HTMLElement>) => {
      const found = find(event);
      if (!found || event.button !== 0) return;
      start.current = { ...found.point, distanceM: found.distanceM };
      // Touch: a finger scrolls the page, so only mouse and pen brush.
      if (event.pointerType !== "touch") event.currentTarget.setPointerCapture(event.pointerId);
    },
    onPointerMove: (event: PointerEvent<HTMLElement>) => {
      const found = find(event);
      if (!found || !track) return;
      const { record, row, point, distanceM } = found;
      store.getState().pointAt({ pass: track.pass, record, row });
      if (start.current && event.pointerType !== "touch" && movedFar(point)) {
        const [fromM, toM] = [start.current.distanceM, distanceM].sort((a, b) => a - b) as [number, number];
        store.getState().brush({ pass: track.pass, fromM, toM });
      }
    },
    onPointerUp: (event: PointerEvent<HTMLElement>) => {
      const found = find(event);
      if (!found || !track || !start.current) return;
      const brushed = movedFar(found.point);
      start.current = null;
      const { pointAt, chooseRow, brush, askToFrame, stretch } = {
        ...store.getState(),
      };
      if (!brushed) {
        pointAt({ pass: track.pass, record: found.record, row: found.row });
        brush(null);
        if (event.pointerType !== "touch") chooseRow(found.row);
      } else if (stretch) {
        const first = recordAtDistance(track, stretch.fromM);
        const last = recordAtDistance(track, stretch.toM);
        askToFrame(boundsOfPositions(stretchRing(track, null, first, last)));
      }
    },
    onPointerCancel: () => {
      start.current = null;
    },
    onPointerLeave: (event: PointerEvent<HTMLElement>) => {
      if (event.pointerType !== "touch" && !start.current) store.getState().pointAt(null);
    },
  };
}
