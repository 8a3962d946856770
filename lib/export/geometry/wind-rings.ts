import { rewind } from "@turf/turf";
import type { MultiPolygon, Polygon } from "geojson";

/** Rings by the right-hand rule of RFC 7946 3.1.6: outer ones anticlockwise, holes clockwise. */
export function windRightHanded<Shape extends Polygon | MultiPolygon>(shape: Shape): Shape {
  return rewind(shape) as Shape;
}

/** The other way round, as shapefiles want it. */
export function windLeftHanded<Shape extends Polygon | MultiPolygon>(shape: Shape): Shape {
  return rewind(shape, { reverse: true }) as Shape;
}

/** The polygons that a shape consists of, each a list of rings. */
export function polygonsOf(shape: Polygon | MultiPolygon): Polygon["coordinates"][] {
  return shape.type === "Polygon" ? [shape.coordinates] : shape.coordinates;
}
