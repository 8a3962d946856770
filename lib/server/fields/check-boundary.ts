import "server-only";
import { AppError } from "@/lib/errors";
import { findBoundaryFault } from "@/lib/geo/find-boundary-fault";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { mergeOverlappingParts, sayOverlap } from "@/lib/geo/merge-overlapping-parts";
import type { Boundary } from "@/lib/schemas/geometry";

/** Larger than any farm on earth: such a boundary has its coordinates swapped or mistaken. */
const LARGEST_AREA_M2 = 1e11;

function refuse(place: string, message: string): never {
  throw new AppError("unprocessable", `The boundary's ${place} ${message}.`, {
    detailCode: "bad_boundary",
    places: [{ path: "boundary", message: `${place} ${message}` }],
  });
}

/**
 * The boundary with its area on the WGS 84 ellipsoid. @throws AppError `unprocessable` naming the ring and the place
 * where it crosses itself. Ground in two parts counts once: they become one.
 */
export function checkBoundary(boundary: Boundary): { boundary: Boundary; areaM2: number } {
  const fault = findBoundaryFault(boundary);
  if (fault) refuse(fault.place, fault.message);
  const { boundary: merged } = mergeOverlappingParts(boundary);
  const areaM2 = geodesicAreaM2(merged);
  if (!(areaM2 > 0)) refuse("rings", "enclose no area");
  if (areaM2 > LARGEST_AREA_M2) refuse("rings", `enclose ${Math.round(areaM2 / 1e6)} km2, more than any field`);
  return { boundary: merged, areaM2 };
}

/** Says that parts of a boundary overlap, of which `checkBoundary` makes one. */
export function noteOverlap(boundary: Boundary): string[] {
  const { overlapM2 } = mergeOverlappingParts(boundary);
  return overlapM2 === 0 ? [] : [sayOverlap(overlapM2)];
}
