import { createLocalPlane } from "@/lib/geo/local-plane";

/** Moves a geometry; `null` stays null. */
export type MoveGeometry = <G extends object>(geometry: G | null) => G | null;

type Position = [number, number];

function isPosition(value: unknown): value is Position {
  return Array.isArray(value) && typeof value[0] === "number" && typeof value[1] === "number";
}

function firstPosition(value: unknown): Position | null {
  if (isPosition(value)) return value;
  if (typeof value !== "object" || value === null) return null;
  for (const inner of Object.values(value)) {
    const found = firstPosition(inner);
    if (found) return found;
  }
  return null;
}

function mapPositions(value: unknown, move: (position: Position) => Position): unknown {
  if (isPosition(value)) return move(value);
  if (Array.isArray(value)) return value.map((inner) => mapPositions(inner, move));
  if (typeof value !== "object" || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([key, inner]) => [key, mapPositions(inner, move)]));
}

/** Six decimals, 0.1 m: the original digits could be matched against a public map of boundaries. */
function rounded([longitude, latitude]: Position): Position {
  return [Math.round(longitude * 1e6) / 1e6, Math.round(latitude * 1e6) / 1e6];
}

/**
 * How to hide where a field lies: every geometry is moved, shape and size kept, so that the first corner of `anchor`
 * comes to 0° N 0° E. Without an anchor nothing can be moved, and geometries become null.
 */
export function moveToOrigin(anchor: unknown): MoveGeometry {
  const first = firstPosition(anchor);
  if (!first) return () => null;
  const here = createLocalPlane(first[0], first[1]);
  const origin = createLocalPlane(0, 0);
  const move = ([longitude, latitude]: Position) => rounded(origin.toDegrees(...here.toPlane(longitude, latitude)));
  // The walk changes positions only, so the type stays.
  return <G extends object>(geometry: G | null) => (geometry ? (mapPositions(geometry, move) as G) : null);
}
