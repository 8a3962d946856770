import type { Position } from "geojson";

export interface ScreenPoint {
  x: number;
  y: number;
}

/** How a map puts places on the screen and back. */
export interface ScreenProjection {
  project: (longitude: number, latitude: number) => ScreenPoint;
  unproject: (x: number, y: number) => { lng: number; lat: number };
}

/** Nearer to a corner or side than this, a point goes onto it. A fingertip is about twice as wide. */
const REACH_PX = 14;

function distancePx(a: ScreenPoint, b: ScreenPoint): number {
  return Math.hypot(a.x - b.x, a.y - b.y);
}

/** The point of a side nearest to another point. */
function nearestOnSide(point: ScreenPoint, from: ScreenPoint, to: ScreenPoint): ScreenPoint {
  const [dx, dy] = [to.x - from.x, to.y - from.y];
  const square = dx * dx + dy * dy;
  const share = square === 0 ? 0 : ((point.x - from.x) * dx + (point.y - from.y) * dy) / square;
  const along = Math.min(1, Math.max(0, share));
  return { x: from.x + along * dx, y: from.y + along * dy };
}

/**
 * The corner of a ring within reach of a point of the screen, else the nearest place on a side within reach, else
 * undefined. Corners come first: who aims at one means it, not the side beside it.
 */
export function snapToRings(
  point: ScreenPoint,
  rings: readonly Position[][],
  { project, unproject }: ScreenProjection,
): Position | undefined {
  let corner: { place: Position; away: number } | null = null;
  let side: { at: ScreenPoint; away: number } | null = null;
  for (const ring of rings) {
    let before: ScreenPoint | null = null;
    for (const place of ring) {
      const at = project(place[0] ?? NaN, place[1] ?? NaN);
      const away = distancePx(point, at);
      if (away <= REACH_PX && away < (corner?.away ?? Infinity)) corner = { place, away };
      if (before) {
        const near = nearestOnSide(point, before, at);
        const nearAway = distancePx(point, near);
        if (nearAway <= REACH_PX && nearAway < (side?.away ?? Infinity)) side = { at: near, away: nearAway };
      }
      before = at;
    }
  }
  if (corner) return [corner.place[0] ?? NaN, corner.place[1] ?? NaN];
  if (!side) return undefined;
  const { lng, lat } = unproject(side.at.x, side.at.y);
  return [Number(lng.toFixed(9)), Number(lat.toFixed(9))];
}
