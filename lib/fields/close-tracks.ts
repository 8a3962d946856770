import geodesic from "geographiclib-geodesic";
import type { FeatureCollection, Geometry, Polygon, Position } from "geojson";
import { BoundaryFileFailure } from "@/lib/fields/boundary-file-error";

/** Geometries to look for polygons in, and what a person should know of how they came about. */
export interface ClosedTracks {
  places: unknown;
  notes: string[];
}

/**
 * A track whose ends lie farther apart than this share of its length is a way, not an edge. Walking or driving a field's
 * edge, people stop a few metres before where they began. Common practice, no source.
 */
const WIDEST_GAP = 0.1;
/** Under this, ends are one place: the receiver's own error. */
const SAME_PLACE_M = 0.5;

function distanceM(from: Position, to: Position): number {
  return geodesic.Geodesic.WGS84.Inverse(from[1] ?? NaN, from[0] ?? NaN, to[1] ?? NaN, to[0] ?? NaN).s12 ?? NaN;
}

/** A track may be in several segments where the receiver lost its fix: they follow each other. */
function lineOf(geometry: Geometry | null): Position[] {
  if (geometry?.type === "LineString") return geometry.coordinates;
  return geometry?.type === "MultiLineString" ? geometry.coordinates.flat() : [];
}

interface Track {
  name: string;
  line: Position[];
  gapM: number;
  lengthM: number;
}

function describeTrack(name: string, line: Position[]): Track {
  const lengthM = line.slice(1).reduce((sum, at, index) => sum + distanceM(line[index] ?? at, at), 0);
  const [first = [], last = []] = [line[0], line.at(-1)];
  return { name, line, lengthM, gapM: distanceM(first, last) };
}

function isClosed({ gapM, lengthM }: Track): boolean {
  return gapM <= Math.max(SAME_PLACE_M, lengthM * WIDEST_GAP);
}

const say = (metres: number) => `${metres < 10 ? metres.toFixed(1) : Math.round(metres)} m`;

/**
 * Polygons of the tracks and routes that come back to where they began; how far each was open is said. A way that does not
 * come back is passed over beside others that do. @throws BoundaryFileFailure where none comes back
 */
export function closeTracks({ features }: FeatureCollection<Geometry | null>): ClosedTracks {
  const tracks = features.flatMap(({ geometry, properties }, index) => {
    const line = lineOf(geometry);
    const name = typeof properties?.name === "string" ? `"${properties.name}"` : `track ${index + 1}`;
    return line.length >= 3 ? [describeTrack(name, line)] : [];
  });
  const [closed, open] = [tracks.filter(isClosed), tracks.filter((track) => !isClosed(track))];
  if (closed.length === 0) {
    const [first] = open;
    const why = first
      ? `${first.name} ends ${say(first.gapM)} from where it began, of ${say(first.lengthM)} in all`
      : "there is no track or route of three or more points in it";
    throw new BoundaryFileFailure(
      "no-polygon",
      `No track goes round a field: ${why}. Go all the way round and save again.`,
    );
  }
  // Left open here: a ring without its last position is closed like those of any other file.
  const geometries = closed.map(({ line }): Polygon => ({ type: "Polygon", coordinates: [line] }));
  return {
    places: { type: "GeometryCollection", geometries },
    notes: [...closed.flatMap(noteGap), ...open.map(noteOpen)],
  };
}

function noteGap({ name, gapM }: Track): string[] {
  return gapM <= SAME_PLACE_M ? [] : [`The ends of ${name} lay ${say(gapM)} apart and were joined by a straight line.`];
}

function noteOpen({ name, gapM }: Track): string {
  return `${name[0]?.toUpperCase() ?? ""}${name.slice(1)} was left out: it ends ${say(gapM)} from where it began.`;
}
