import { featureCollection, intersect, polygon as turfPolygon } from "@turf/turf";
import type { MultiPolygon, Polygon, Position } from "geojson";

/** A longitude moved by whole turns to within 180 degrees of another. */
export function longitudeNear(longitude: number, near: number): number {
  return longitude - 360 * Math.round((longitude - near) / 360);
}

/** Positions whose longitudes run on past 180 rather than jump; each lies near the one before, the first near `near`. */
export function unwrapPositions(positions: readonly Position[], near?: number): Position[] {
  let last = near ?? positions[0]?.[0] ?? NaN;
  return positions.map(([longitude = NaN, ...rest]) => {
    last = longitudeNear(longitude, last);
    return [last, ...rest];
  });
}

/**
 * Rings of one polygon, the outer first, as RFC 7946 3.1.9 wants them: in one piece where they do not cross the antimeridian,
 * else cut there into parts. Their corners may jump from 180 to -180 or run on past it.
 */
export function cutAtAntimeridian(rings: readonly Position[][]): Polygon | MultiPolygon {
  const near = rings[0]?.[0]?.[0];
  const whole = rings.map((ring) => unwrapPositions(ring, near));
  const longitudes = (whole[0] ?? []).map((corner) => corner[0] ?? NaN);
  const [west, east] = [Math.min(...longitudes), Math.max(...longitudes)];
  if (!(west < -180 || east > 180)) return { type: "Polygon", coordinates: whole };
  const meridian = east > 180 ? 180 : -180;
  const parts = [clip(whole, meridian - 360, meridian), clip(whole, meridian, meridian + 360)].flat();
  const home = parts.map((part) => part.map((ring) => moveHome(ring)));
  return home.length === 1 ? { type: "Polygon", coordinates: home[0]! } : { type: "MultiPolygon", coordinates: home };
}

function clip(rings: Position[][], west: number, east: number): Position[][][] {
  const window = [
    [west, -90],
    [east, -90],
    [east, 90],
    [west, 90],
    [west, -90],
  ];
  const part = intersect(featureCollection([turfPolygon(rings), turfPolygon([window])]));
  if (!part) return [];
  return part.geometry.type === "Polygon" ? [part.geometry.coordinates] : part.geometry.coordinates;
}

/** By whole turns, so that the ring's middle lies between -180 and 180. */
function moveHome(ring: Position[]): Position[] {
  const longitudes = ring.map((corner) => corner[0] ?? NaN);
  const middle = (Math.min(...longitudes) + Math.max(...longitudes)) / 2;
  const shift = middle - longitudeNear(middle, 0);
  return ring.map(([longitude = NaN, ...rest]) => [longitude - shift, ...rest]);
}

/** A line cut where it crosses the antimeridian: each part ends on it and the next begins there, on the other side. */
export function cutLineAtAntimeridian(line: readonly Position[]): Position[][] {
  const parts: Position[][] = [];
  let open: Position[] = [];
  for (const [k, [longitude = NaN, latitude = NaN]] of line.entries()) {
    const before = open[open.length - 1];
    if (k > 0 && before && Math.abs(longitude - before[0]!) > 180) {
      const side = before[0]! > 0 ? 180 : -180;
      const onward = longitudeNear(longitude, before[0]!);
      const share = onward === before[0]! ? 0 : (side - before[0]!) / (onward - before[0]!);
      const crossing = before[1]! + share * (latitude - before[1]!);
      parts.push([...open, [side, crossing]]);
      open = [[-side, crossing]];
    }
    open.push([longitude, latitude]);
  }
  return [...parts, open].filter((part) => part.length > 1);
}
