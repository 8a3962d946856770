import type { Polygon } from "geojson";
import type { LocalPlane } from "@/lib/geo/local-plane";
import { createFieldAxes, type FieldAxes } from "@/lib/simulator/plan-passes";
import { implementWidthM, type SimulationOptions } from "@/lib/simulator/simulation-options";

export interface BlockHalfSides {
  halfAlongM: number;
  halfAcrossM: number;
}

/** Half the sides of a block: its passes, the turning ground at the ends, and the headland rounds all about. */
export function blockHalfSides(options: SimulationOptions): BlockHalfSides {
  if (options.shape.kind !== "block") throw new RangeError("blockHalfSides needs a block, got a polygon");
  const widthM = implementWidthM(options.machine);
  const roundsM = (options.headland?.rounds ?? 0) * widthM;
  const { passes, passLengthM } = options.shape;
  const drilledM = (passes - 1) * (options.passSpacingM ?? widthM) + widthM;
  return {
    halfAlongM: passLengthM / 2 + (roundsM > 0 ? roundsM : options.headlandM),
    halfAcrossM: drilledM / 2 + roundsM,
  };
}

/** The field's corners in field axes [along, across], clockwise from the start of the leftmost pass. */
export function fieldRing(options: SimulationOptions, plane: LocalPlane, axes: FieldAxes): [number, number][] {
  if (options.shape.kind === "polygon") {
    return options.shape.ring.map(([longitude, latitude]) => axes.fromPlane(...plane.toPlane(longitude, latitude)));
  }
  const { halfAlongM: along, halfAcrossM: across } = blockHalfSides(options);
  return [
    [-along, -across],
    [along, -across],
    [along, across],
    [-along, across],
  ];
}

/** The field's boundary as GeoJSON, counter-clockwise and closed (RFC 7946). */
export function fieldBoundary(options: SimulationOptions, plane: LocalPlane): Polygon {
  const axes = createFieldAxes(options.headingDeg);
  return toPolygon(
    fieldRing(options, plane, axes).map(([along, across]) => axes.toPlane(along, across)),
    plane,
  );
}

/** A rectangle about a plane's centre, its long side along `headingDeg`, as a ring of [longitude, latitude]. */
export function rectangleRing(
  plane: LocalPlane,
  headingDeg: number,
  lengthM: number,
  widthM: number,
): [number, number][] {
  const axes = createFieldAxes(headingDeg);
  const corners: [number, number][] = [
    [-lengthM / 2, -widthM / 2],
    [lengthM / 2, -widthM / 2],
    [lengthM / 2, widthM / 2],
    [-lengthM / 2, widthM / 2],
  ];
  return corners.map(([along, across]) => plane.toDegrees(...axes.toPlane(along, across)));
}

function toPolygon(corners: [number, number][], plane: LocalPlane): Polygon {
  // Nine decimals are 0.1 mm: enough for an area, and short in a file.
  const ring = corners.map(([eastM, northM]) =>
    plane.toDegrees(eastM, northM).map((degrees) => Math.round(degrees * 1e9) / 1e9),
  );
  const doubledArea = corners.reduce((sum, [east, north], index) => {
    const [nextEast, nextNorth] = corners[(index + 1) % corners.length] ?? [east, north];
    return sum + east * nextNorth - nextEast * north;
  }, 0);
  if (doubledArea < 0) ring.reverse();
  const first = ring[0];
  return { type: "Polygon", coordinates: [first ? [...ring, first] : ring] };
}
