import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { MiddleReadings } from "@/lib/statistics/middle-readings";
import { BUCKETS, findPlace, valueBetween, type Steps } from "@/lib/statistics/select-quantiles";

/** Of one row: how much ground each value of the channel stands for. A log's readings are multiples of its own rounding. */
export interface RowTally {
  /** One entry a value, ascending; `sums` is 0 where no reading has weight. */
  steps: Steps;
  /** Distance that each value stands for. */
  sums: Float64Array;
  /** All readings, also those that stand for no distance, and the least and the greatest of them; NaN without any. */
  n: number;
  min: number;
  max: number;
  /** Weighted median of the row's deviations from the other rows; NaN without any, null where it cannot be told from tallies. */
  typicalDeviation: number | null;
}

const ROWS_AT_ONCE = 8;
/** Deviations are halves of the log's rounding; those beyond so many count as that many. */
const MOST_DEVIATION = BUCKETS / 2 - 1;
const LAST_DEVIATION = 2 * MOST_DEVIATION;

/** Single precision blurs the steps of a log; values that differ by less than this share of a step are one value. */
const BLUR = 1e-3;

/** How values become places in a tally. */
interface Scale {
  min: number;
  perUnit: number;
}

/**
 * Tallies every row of a channel in one walk over its readings, neighbouring rows together, and calls `describe` with each; the
 * tally is overwritten by later ones. Gives null, with nothing to rely on, where the readings are no multiples of the channel's
 * resolution or of too many of them: their series must then be described one by one.
 */
export function mapRowTallies<T>(
  placed: PlacedLog,
  channel: ResolvedChannel,
  given: { distances: Float32Array; middles: MiddleReadings },
  describe: (tally: RowTally, row: number) => T,
): T[] | null {
  const scale = scaleOf(channel);
  if (!scale || channel.rows !== placed.geometry.rows) return null;
  const room = { readings: createTallies(), deviations: createTallies(), besides: new Float64Array(3 * ROWS_AT_ONCE) };
  const members = membersOf(placed);
  const made: T[] = [];
  for (let first = 0; first < channel.rows; first += ROWS_AT_ONCE) {
    const count = Math.min(ROWS_AT_ONCE, channel.rows - first);
    tallyBlock(channel, given, { scale, members, room, first, count });
    if (room.readings.isMixed) return null;
    for (let k = 0; k < count; k++) made.push(describe(tallyOf(room, k, members.length), first + k + 1));
  }
  return made;
}

// kernel: hot loop over every reading
function scaleOf({ values, resolution }: ResolvedChannel): Scale | null {
  let min = Infinity;
  let max = -Infinity;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    if (value < min) min = value;
    if (value > max) max = value;
  }
  if (resolution === null || !(max - min < (BUCKETS - 2) * resolution)) return null;
  return { min, perUnit: 1 / resolution };
}

function membersOf({ passOf }: PlacedLog): Int32Array {
  const members = new Int32Array(passOf.length);
  let n = 0;
  for (let record = 0; record < passOf.length; record++) if (passOf[record] !== 0) members[n++] = record;
  return members.subarray(0, n);
}

/** Tallies of several rows side by side. */
interface Tallies {
  sums: Float64Array;
  firsts: Float32Array;
  lasts: Float32Array;
  /** Value of each step, the same for all rows; NaN while there is none. */
  values: Float32Array;
  /** Whether two values fell on one step. */
  isMixed: boolean;
}

function createTallies(): Tallies {
  const size = ROWS_AT_ONCE * BUCKETS;
  return {
    sums: new Float64Array(size),
    firsts: new Float32Array(size),
    lasts: new Float32Array(size),
    values: new Float32Array(BUCKETS).fill(NaN),
    isMixed: false,
  };
}

interface Room {
  readings: Tallies;
  deviations: Tallies;
  /** Of each row: records without a reading, and the least and the greatest reading that stands for no distance. */
  besides: Float64Array;
}

interface Block {
  scale: Scale;
  members: Int32Array;
  room: Room;
  first: number;
  count: number;
}

/** kernel: one walk over a block of rows, hot over every reading. */
function tallyBlock(
  channel: ResolvedChannel,
  { distances, middles }: { distances: Float32Array; middles: MiddleReadings },
  { scale, members, room, first, count }: Block,
): void {
  const { sums, firsts, lasts, values } = room.readings;
  const { besides } = room;
  const { sums: otherSums, firsts: otherFirsts, lasts: otherLasts, values: otherValues } = room.deviations;
  sums.fill(0);
  otherSums.fill(0);
  for (let k = 0; k < besides.length; k++) besides[k] = k % 3 === 0 ? 0 : NaN;
  const readings = channel.values;
  const { medians } = middles;
  const { min, perUnit } = scale;
  const blur = BLUR / perUnit;
  const stride = channel.rows;
  let mixed = 0;
  let otherMixed = 0;
  for (let i = 0; i < members.length; i++) {
    const record = members[i]!;
    const from = record * stride + first;
    const at = medians[4 * record]!;
    for (let k = 0; k < count; k++) {
      const value = readings[from + k]!;
      const weight = distances[from + k]!;
      if (!(weight > 0) || value !== value) {
        noteBesides(besides, k, value);
        continue;
      }
      const step = ((value - min) * perUnit + 0.5) | 0;
      const known = values[step]!;
      if (known !== value) {
        if (known !== known) values[step] = value;
        else if (Math.abs(known - value) > blur) mixed = 1;
      }
      const place = k * BUCKETS + step;
      const sum = sums[place]!;
      if (sum === 0) firsts[place] = weight;
      lasts[place] = weight;
      sums[place] = sum + weight;
      const deviation = Math.fround(value - medians[4 * record + 1 + +(value >= at) + +(value > at)]!);
      if (deviation !== deviation) continue;
      const halves = Math.max(-MOST_DEVIATION, Math.min(MOST_DEVIATION, deviation * 2 * perUnit));
      const other = (halves + (MOST_DEVIATION + 0.5)) | 0;
      const otherKnown = otherValues[other]!;
      if (otherKnown !== deviation) {
        if (otherKnown !== otherKnown) otherValues[other] = deviation;
        else if (Math.abs(otherKnown - deviation) > blur && other > 0 && other < LAST_DEVIATION) otherMixed = 1;
      }
      const otherPlace = k * BUCKETS + other;
      const otherSum = otherSums[otherPlace]!;
      if (otherSum === 0) otherFirsts[otherPlace] = weight;
      otherLasts[otherPlace] = weight;
      otherSums[otherPlace] = otherSum + weight;
    }
  }
  room.readings.isMixed ||= mixed === 1;
  room.deviations.isMixed ||= otherMixed === 1;
}

/** A record without a reading of the row, or a reading that stands for no distance: both are rare. */
// kernel: hot, so positional
function noteBesides(besides: Float64Array, k: number, value: number): void {
  const missing = 3 * k;
  if (value !== value) {
    besides[missing]!++;
    return;
  }
  if (!(value >= besides[missing + 1]!)) besides[missing + 1] = value;
  if (!(value <= besides[missing + 2]!)) besides[missing + 2] = value;
}

const NO_STEP_IS_MIXED = new Uint8Array(BUCKETS);

function stepsOf({ firsts, lasts, values }: Tallies, k: number): Steps {
  const of = (all: Float32Array) => all.subarray(k * BUCKETS, (k + 1) * BUCKETS);
  return { firsts: of(firsts), lasts: of(lasts), values, mixed: NO_STEP_IS_MIXED };
}

function sumsOf({ sums }: Tallies, k: number): Float64Array {
  return sums.subarray(k * BUCKETS, (k + 1) * BUCKETS);
}

function tallyOf({ readings, deviations, besides }: Room, k: number, records: number): RowTally {
  const steps = stepsOf(readings, k);
  const sums = sumsOf(readings, k);
  const least = sums.findIndex((sum) => sum > 0);
  const greatest = sums.findLastIndex((sum) => sum > 0);
  const among = [steps.values[least], steps.values[greatest], besides[3 * k + 1], besides[3 * k + 2]];
  const known = among.filter((value): value is number => value !== undefined && !Number.isNaN(value));
  return {
    steps,
    sums,
    n: records - besides[3 * k]!,
    min: known.length > 0 ? Math.min(...known) : NaN,
    max: known.length > 0 ? Math.max(...known) : NaN,
    typicalDeviation: medianDeviation(deviations, k),
  };
}

/** Null where a step at the median holds several values: they would have to be sorted. */
function medianDeviation(deviations: Tallies, k: number): number | null {
  const sums = sumsOf(deviations, k);
  const total = sums.reduce((sum, one) => sum + one, 0);
  if (!(total > 0)) return NaN;
  const place = findPlace(sums, 0.5 * total);
  const isAtAnEnd =
    place.low === 0 || place.bucket === 0 || place.bucket === LAST_DEVIATION || place.high === LAST_DEVIATION;
  if (deviations.isMixed || isAtAnEnd) return null;
  return valueBetween(stepsOf(deviations, k), sums, place);
}
