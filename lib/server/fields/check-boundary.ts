import "server-only";
import { AppError } from "@/lib/errors";
import { findBoundaryFault } from "@/lib/geo/find-boundary-fault";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
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
 * where it crosses itself.
 */
export function checkBoundary(boundary: Boundary): { boundary: Boundary; areaM2: number } {
  const fault = findBoundaryFault(boundary);
  if (fault) refuse(fault.place, fault.message);
  const areaM2 = geodesicAreaM2(boundary);
  if (!(areaM2 > 0)) refuse("rings", "enclose no area");
  if (areaM2 > LARGEST_AREA_M2) refuse("rings", `enclose ${Math.round(areaM2 / 1e6)} km2, more than any field`);
  return { boundary, areaM2 };
}
