import type { PlacedLog } from "@/lib/logs/placed-log";
import { fromWorld, toWorld, worldPerMetre } from "@/lib/tiles/tile-address";
import { CHUNK_RECORDS, type TileBounds, type TileIndex } from "@/lib/tiles/tile-index";

const DEGREES = Math.PI / 180;

/** Lays a placed log out for drawing. A cell never joins records across a pass break. Cost: O(records x rows). */
export function buildTileIndex(placed: PlacedLog): TileIndex {
  const index = emptyIndex(placed);
  placeFrames(placed, index);
  linkRecords(placed, index);
  measureCells(placed, index);
  boundChunks(index);
  return index;
}

/** What the index covers in degrees, or null when nothing is drawn. */
export function tileIndexBounds(index: TileIndex): TileBounds | null {
  const box = [Infinity, -Infinity, Infinity, -Infinity] as [number, number, number, number];
  for (let chunk = 0; chunk * 4 < index.chunkBounds.length; chunk += 1) {
    const at = chunk * 4;
    box[0] = Math.min(box[0], index.chunkBounds[at]!);
    box[1] = Math.max(box[1], index.chunkBounds[at + 1]!);
    box[2] = Math.min(box[2], index.chunkBounds[at + 2]!);
    box[3] = Math.max(box[3], index.chunkBounds[at + 3]!);
  }
  if (box[0] > box[1]) return null;
  const [west, north] = fromWorld(box[0], box[2]);
  const [east, south] = fromWorld(box[1], box[3]);
  return [wrapLongitude(west), south, wrapLongitude(east), north];
}

/** The same for TileJSON, whose west may not lie east of its east: across the antimeridian the whole width of the map. */
export function tileJsonBounds(index: TileIndex): TileBounds {
  const [west, south, east, north] = tileIndexBounds(index) ?? [-180, -85, 180, 85];
  return west > east ? [-180, south, 180, north] : [west, south, east, north];
}

function wrapLongitude(longitude: number): number {
  return ((((longitude + 180) % 360) + 360) % 360) - 180;
}

function emptyIndex(placed: PlacedLog): TileIndex {
  const { records } = placed.log;
  const frames = records + placed.passes.length;
  const { geometry } = placed;
  const scale = worldPerMetre(placed.plane.latitude);
  return {
    records,
    rows: geometry.rows,
    originX: new Float64Array(frames).fill(NaN),
    originY: new Float64Array(frames).fill(NaN),
    rightX: new Float64Array(frames),
    rightY: new Float64Array(frames),
    forwardX: new Float64Array(frames),
    forwardY: new Float64Array(frames),
    previousFrame: new Int32Array(records).fill(-1),
    rowOffsetM: Float64Array.from(geometry.offsetM),
    rowForwardM: Float64Array.from(geometry.forwardM),
    rowWidthM: Float64Array.from(geometry.widthM),
    cellLengthM: new Float32Array(records * geometry.rows),
    chunkBounds: new Float64Array(4 * Math.ceil(records / CHUNK_RECORDS)),
    narrowestRowM: geometry.rows > 0 ? Math.min(...geometry.widthM) : 0,
    medianCellLengthM: 0,
    worldPerM: (scale.east + scale.north) / 2,
  };
}

function placeFrames(placed: PlacedLog, index: TileIndex): void {
  for (let record = 0; record < index.records; record += 1) {
    if (placed.passOf[record]! <= 0) continue;
    const pose = {
      eastM: placed.originEastM[record]!,
      northM: placed.originNorthM[record]!,
      headingDeg: placed.headingDeg[record]!,
    };
    if (Number.isFinite(pose.eastM + pose.northM + pose.headingDeg)) writeFrame(placed, index, record, pose);
  }
}

interface Pose {
  eastM: number;
  northM: number;
  headingDeg: number;
}

function writeFrame(placed: PlacedLog, index: TileIndex, frame: number, pose: Pose): void {
  const [longitude, latitude] = placed.plane.toDegrees(pose.eastM, pose.northM);
  // Nearest turn of the globe to the log's own centre: a track over the antimeridian stays in one piece.
  const unwrapped = longitude - 360 * Math.round((longitude - placed.plane.longitude) / 360);
  const [x, y] = toWorld(unwrapped, latitude);
  const scale = worldPerMetre(latitude);
  // The plane's north turns away from true north off its meridian (first term of the convergence; the next is below 1e-7 rad at 10 km).
  const convergence = (unwrapped - placed.plane.longitude) * DEGREES * Math.sin(latitude * DEGREES);
  const bearing = pose.headingDeg * DEGREES + convergence;
  index.originX[frame] = x;
  index.originY[frame] = y;
  index.forwardX[frame] = Math.sin(bearing) * scale.east;
  index.forwardY[frame] = -Math.cos(bearing) * scale.north;
  index.rightX[frame] = Math.cos(bearing) * scale.east;
  index.rightY[frame] = Math.sin(bearing) * scale.north;
}

/** Finds where each record's cells begin: the record before in the same pass, or a made-up frame before the first. */
function linkRecords(placed: PlacedLog, index: TileIndex): void {
  placed.passes.forEach((pass, order) => {
    let before = -1;
    let second = -1;
    let firstRecord = -1;
    for (let record = pass.first; record < pass.first + pass.records; record += 1) {
      if (placed.passOf[record] !== pass.pass || Number.isNaN(index.originX[record]!)) continue;
      if (before >= 0) index.previousFrame[record] = before;
      else firstRecord = record;
      if (before >= 0 && second < 0) second = record;
      before = record;
    }
    if (second < 0) return;
    const start = index.records + order;
    writeFrame(placed, index, start, poseBefore(placed, firstRecord, second));
    index.previousFrame[firstRecord] = start;
  });
}

/** The first record's cell reaches as far back as the next one reaches on: the move from it to the next, undone once more. */
function poseBefore(placed: PlacedLog, first: number, second: number): Pose {
  const heading = placed.headingDeg[first]! * DEGREES;
  const turn = (placed.headingDeg[second]! - placed.headingDeg[first]!) * DEGREES;
  const east = placed.originEastM[second]! - placed.originEastM[first]!;
  const north = placed.originNorthM[second]! - placed.originNorthM[first]!;
  const ahead = east * Math.sin(heading) + north * Math.cos(heading);
  const right = east * Math.cos(heading) - north * Math.sin(heading);
  const earlier = heading - turn;
  return {
    eastM: placed.originEastM[first]! - ahead * Math.sin(earlier) - right * Math.cos(earlier),
    northM: placed.originNorthM[first]! - ahead * Math.cos(earlier) + right * Math.sin(earlier),
    headingDeg: earlier / DEGREES,
  };
}

function measureCells(placed: PlacedLog, index: TileIndex): void {
  const lengths: number[] = [];
  const { rows } = index;
  for (let record = 0; record < index.records; record += 1) {
    const from = index.previousFrame[record]!;
    if (from < 0) continue;
    const scale = worldPerMetre(fromWorld(0, index.originY[record]!)[1]);
    for (let row = 0; row < rows; row += 1) {
      const x = rowX(index, record, row) - rowX(index, from, row);
      const y = rowY(index, record, row) - rowY(index, from, row);
      index.cellLengthM[record * rows + row] = Math.hypot(x / scale.east, y / scale.north);
    }
    if (rows > 0) lengths.push(index.cellLengthM[record * rows + (rows >> 1)]!);
  }
  lengths.sort((a, b) => a - b);
  index.medianCellLengthM = lengths[lengths.length >> 1] ?? 0;
}

function rowX(index: TileIndex, frame: number, row: number): number {
  return (
    index.originX[frame]! +
    index.rowOffsetM[row]! * index.rightX[frame]! +
    index.rowForwardM[row]! * index.forwardX[frame]!
  );
}

function rowY(index: TileIndex, frame: number, row: number): number {
  return (
    index.originY[frame]! +
    index.rowOffsetM[row]! * index.rightY[frame]! +
    index.rowForwardM[row]! * index.forwardY[frame]!
  );
}

/** The reach of a machine about its origin, in metres: farthest left, right, back and ahead that any row's ground goes. */
function boundChunks(index: TileIndex): void {
  const reachM = Math.max(
    0,
    ...Array.from(index.rowOffsetM, (offset, row) =>
      Math.hypot(Math.abs(offset) + index.rowWidthM[row]! / 2, index.rowForwardM[row]!),
    ),
  );
  for (let chunk = 0; chunk * 4 < index.chunkBounds.length; chunk += 1) {
    index.chunkBounds.set([Infinity, -Infinity, Infinity, -Infinity], chunk * 4);
    const end = Math.min(index.records, (chunk + 1) * CHUNK_RECORDS);
    for (let record = chunk * CHUNK_RECORDS; record < end; record += 1) {
      const from = index.previousFrame[record]!;
      if (from < 0) continue;
      growBounds(index, chunk * 4, from, reachM);
      growBounds(index, chunk * 4, record, reachM);
    }
  }
}

function growBounds(index: TileIndex, at: number, frame: number, reachM: number): void {
  const reachX = reachM * Math.hypot(index.rightX[frame]!, index.forwardX[frame]!);
  const reachY = reachM * Math.hypot(index.rightY[frame]!, index.forwardY[frame]!);
  const bounds = index.chunkBounds;
  bounds[at] = Math.min(bounds[at]!, index.originX[frame]! - reachX);
  bounds[at + 1] = Math.max(bounds[at + 1]!, index.originX[frame]! + reachX);
  bounds[at + 2] = Math.min(bounds[at + 2]!, index.originY[frame]! - reachY);
  bounds[at + 3] = Math.max(bounds[at + 3]!, index.originY[frame]! + reachY);
}
