import { longitudeNear } from "@/lib/geo/cut-at-antimeridian";
import type { Position } from "geojson";
import type { PassTrack } from "@/lib/map-state/pass-track";
import { worldPerMetre } from "@/lib/tiles/tile-address";

const DEGREES = Math.PI / 180;

interface Frame {
  longitude: number;
  latitude: number;
  headingRad: number;
}

/** The machine where a record's cell begins: at the record before, or for the first one as far back as the next lies ahead. */
function frameBefore(track: PassTrack, record: number): Frame {
  if (record > 0) return frameAt(track, record - 1);
  const first = frameAt(track, 0);
  if (track.records < 2) return first;
  const next = frameAt(track, 1);
  return {
    longitude: 2 * first.longitude - next.longitude,
    latitude: 2 * first.latitude - next.latitude,
    headingRad: 2 * first.headingRad - next.headingRad,
  };
}

function frameAt(track: PassTrack, record: number): Frame {
  return {
    longitude: track.longitude[record]!,
    latitude: track.latitude[record]!,
    headingRad: track.headingDeg[record]! * DEGREES,
  };
}

function placeFrom(frame: Frame, rightM: number, aheadM: number): Position {
  const scale = worldPerMetre(frame.latitude);
  const east = aheadM * Math.sin(frame.headingRad) + rightM * Math.cos(frame.headingRad);
  const north = aheadM * Math.cos(frame.headingRad) - rightM * Math.sin(frame.headingRad);
  // Mercator world units to degrees: 360 a turn; north shrinks with the cosine.
  return [
    frame.longitude + east * scale.east * 360,
    frame.latitude + north * scale.north * 360 * Math.cos(frame.latitude * DEGREES),
  ];
}

/** Sides of a row (from 1) or, with row null, of the whole implement: right of the centre line, and how far ahead. */
function sidesOf(track: PassTrack, row: number | null): { left: number; right: number; ahead: number } {
  const sideOf = (index: number, side: -1 | 1) =>
    (track.rowOffsetM[index] ?? 0) + (side * (track.rowWidthM[index] ?? 0)) / 2;
  if (row !== null) {
    return { left: sideOf(row - 1, -1), right: sideOf(row - 1, 1), ahead: track.rowForwardM[row - 1] ?? 0 };
  }
  const indices = track.rowOffsetM.map((_, index) => index);
  return {
    left: Math.min(...indices.map((index) => sideOf(index, -1))),
    right: Math.max(...indices.map((index) => sideOf(index, 1))),
    ahead: 0,
  };
}

/** Ring round one reading's cell (row from 1), or round the whole implement's (row null). */
export function cellRing(track: PassTrack, record: number, row: number | null): Position[] {
  const { left, right, ahead } = sidesOf(track, row);
  const start = frameBefore(track, record);
  const end = frameAt(track, record);
  const ring = [
    placeFrom(start, left, ahead),
    placeFrom(start, right, ahead),
    placeFrom(end, right, ahead),
    placeFrom(end, left, ahead),
  ];
  return [...ring, ring[0]!];
}

/** The middle of one reading's cell (row from 1). */
export function middleOfCell(track: PassTrack, record: number, row: number): [longitude: number, latitude: number] {
  const corners = cellRing(track, record, row).slice(0, 4);
  const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;
  return [mean(corners.map(([x]) => x ?? NaN)), mean(corners.map(([, y]) => y ?? NaN))];
}

/** Ring round a stretch of records of one row, or of the whole implement (row null). */
export function stretchRing(track: PassTrack, row: number | null, from = 0, to = track.records - 1): Position[] {
  const { left, right, ahead } = sidesOf(track, row);
  const frames = [frameBefore(track, from)];
  for (let record = from; record <= to; record += 1) frames.push(frameAt(track, record));
  const ring = frames.map((frame) => placeFrom(frame, left, ahead));
  for (const frame of frames.reverse()) ring.push(placeFrom(frame, right, ahead));
  return [...ring, ring[0]!];
}

/** West, south, east, north of rings. */
export function boundsOfPositions(positions: readonly Position[]): [number, number, number, number] {
  const box: [number, number, number, number] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [longitude, latitude] of positions as [number, number][]) {
    box[0] = Math.min(box[0], longitude);
    box[1] = Math.min(box[1], latitude);
    box[2] = Math.max(box[2], longitude);
    box[3] = Math.max(box[3], latitude);
  }
  return box;
}

/** The reading of a pass under a place: its record within the pass and row (from 1); null beside the pass. */
export function locateInPass(
  track: PassTrack,
  longitude: number,
  latitude: number,
): { record: number; row: number } | null {
  const scale = worldPerMetre(latitude);
  const perDegreeEast = 1 / (scale.east * 360);
  const perDegreeNorth = 1 / (scale.north * 360 * Math.cos(latitude * DEGREES));
  const { left, right } = sidesOf(track, null);
  const reach = Math.max(Math.abs(left), Math.abs(right)) + Math.max(0, ...track.rowForwardM.map(Math.abs)) + 10;
  for (let record = track.records - 1; record >= 0; record -= 1) {
    const north = (latitude - track.latitude[record]!) * perDegreeNorth;
    const x = longitudeNear(longitude, track.longitude[record]!);
    const east = (x - track.longitude[record]!) * perDegreeEast;
    if (Math.abs(north) > reach || Math.abs(east) > reach) continue;
    for (let row = 1; row <= track.rowOffsetM.length; row += 1) {
      if (ringHolds(cellRing(track, record, row), x, latitude)) return { record, row };
    }
  }
  return null;
}

function ringHolds(ring: readonly Position[], x: number, y: number): boolean {
  let inside = false;
  for (let i = 1; i < ring.length; i += 1) {
    const [ax, ay] = ring[i - 1] as [number, number];
    const [bx, by] = ring[i] as [number, number];
    if (ay > y !== by > y && ax + ((y - ay) / (by - ay)) * (bx - ax) > x) inside = !inside;
  }
  return inside;
}
