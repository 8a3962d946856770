import { unwrapPositions } from "@/lib/geo/cut-at-antimeridian";
import type { PackablePassReadings } from "@/lib/schemas/packed-readings";

/** The readings of one pass laid out for drawing and hit tests. Per record unless named per row; NaN is missing. */
export interface PassTrack {
  pass: number;
  firstRecord: number;
  channel: string;
  unit: string;
  rows: number;
  records: number;
  /** `values[record * rows + (row - 1)]`. */
  values: Float32Array;
  timesS: Float64Array;
  /** End of each record's cell along the pass, metres from where the first cell begins. */
  endsM: Float64Array;
  lengthM: number;
  longitude: Float64Array;
  latitude: Float64Array;
  headingDeg: Float64Array;
  speedMps: Float64Array;
  flags: Uint32Array;
  rowOffsetM: number[];
  rowForwardM: number[];
  rowWidthM: number[];
}

const NUMBER_OR_NAN = (value: number | null | undefined) => value ?? NaN;

function layOutLists({ records, rows, values: lists }: PackablePassReadings): Float32Array {
  const values = new Float32Array(records * rows);
  lists.forEach((row, index) => {
    for (let record = 0; record < records; record += 1) values[record * rows + index] = NUMBER_OR_NAN(row[record]);
  });
  return values;
}

/** Base64 of little-endian Float32, as every machine that shows a page lays numbers out. */
function unpackValues(text: string): Float32Array {
  const letters = atob(text);
  const bytes = new Uint8Array(letters.length);
  for (let at = 0; at < letters.length; at += 1) bytes[at] = letters.charCodeAt(at);
  return new Float32Array(bytes.buffer);
}

/**
 * Lays out what the readings endpoint answers. The first record's cell reaches back as far as the next one reaches on
 * (the weight rule of the statistics), so the unrolled pass begins there.
 */
export function createPassTrack(readings: PackablePassReadings): PassTrack {
  const { records } = readings;
  const leadM = (readings.distancesM[1] ?? 0) - (readings.distancesM[0] ?? 0);
  const startM = (readings.distancesM[0] ?? 0) - leadM;
  const endsM = Float64Array.from(readings.distancesM, (distance) => distance - startM);
  return {
    pass: readings.pass ?? 0,
    firstRecord: readings.firstRecord ?? 0,
    channel: readings.channel,
    unit: readings.unit,
    rows: readings.rows,
    records,
    values: readings.packedValues === undefined ? layOutLists(readings) : unpackValues(readings.packedValues),
    timesS: Float64Array.from(readings.timesS, NUMBER_OR_NAN),
    endsM,
    lengthM: endsM[records - 1] ?? 0,
    // Across the antimeridian longitudes run on, so that lines and cells do not cross the whole map.
    longitude: Float64Array.from(unwrapPositions(readings.positions), ([longitude = NaN]) => longitude),
    latitude: Float64Array.from(readings.positions, ([, latitude]) => latitude),
    headingDeg: Float64Array.from({ length: records }, (_, i) => NUMBER_OR_NAN(readings.headingsDeg?.[i])),
    speedMps: Float64Array.from({ length: records }, (_, i) => NUMBER_OR_NAN(readings.speedsMps?.[i])),
    flags: Uint32Array.from({ length: records }, (_, i) => readings.flags?.[i] ?? 0),
    rowOffsetM: readings.rowOffsetsM ?? [],
    rowForwardM: readings.rowForwardM ?? [],
    rowWidthM: readings.rowWidthsM ?? [],
  };
}

/** The record whose cell holds a distance along the pass, within the pass's ends. */
export function recordAtDistance(track: PassTrack, distanceM: number): number {
  let low = 0;
  let high = track.records - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (track.endsM[middle]! > distanceM) high = middle;
    else low = middle + 1;
  }
  return Math.max(0, low);
}

/** Where a record's cell begins and ends along the pass. */
export function recordSpanM(track: PassTrack, record: number): [fromM: number, toM: number] {
  return [record > 0 ? track.endsM[record - 1]! : 0, track.endsM[record] ?? 0];
}
