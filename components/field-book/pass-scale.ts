import { recordAtDistance, type PassTrack } from "@/lib/map-state/pass-track";

/** Where things of a pass lie in a box: `across`, distance runs to the right and rows down; `upright`, distance down, rows to the right. */
export type PassOrientation = "across" | "upright";

export interface PassScale {
  orientation: PassOrientation;
  width: number;
  height: number;
  lengthM: number;
  rows: number;
}

/** A rectangle in pixels. */
export interface Box {
  x: number;
  y: number;
  width: number;
  height: number;
}

/** The box of rows `firstRow .. lastRow` (from 1) between two distances. */
export function boxOf(
  scale: PassScale,
  rows: [first: number, last: number],
  stretchM: [from: number, to: number],
): Box {
  const along = (distanceM: number) => distanceM / (scale.lengthM || 1);
  const across = (row: number) => row / (scale.rows || 1);
  const [from, to] = [along(stretchM[0]), along(stretchM[1])];
  const [top, bottom] = [across(rows[0] - 1), across(rows[1])];
  if (scale.orientation === "across") {
    return {
      x: from * scale.width,
      y: top * scale.height,
      width: (to - from) * scale.width,
      height: (bottom - top) * scale.height,
    };
  }
  return {
    x: top * scale.width,
    y: from * scale.height,
    width: (bottom - top) * scale.width,
    height: (to - from) * scale.height,
  };
}

/** The distance and reading under a point of the box, kept within the pass. */
export function readingAt(
  scale: PassScale,
  track: PassTrack,
  point: { x: number; y: number },
): { distanceM: number; record: number; row: number } {
  const [along, across] =
    scale.orientation === "across"
      ? [point.x / scale.width, point.y / scale.height]
      : [point.y / scale.height, point.x / scale.width];
  const distanceM = Math.min(scale.lengthM, Math.max(0, along * scale.lengthM));
  const row = Math.min(scale.rows, Math.max(1, Math.floor(across * scale.rows) + 1));
  return { distanceM, record: recordAtDistance(track, distanceM), row };
}
