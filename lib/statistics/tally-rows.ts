import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { MiddleReadings } from "@/lib/statistics/middle-readings";
import { BUCKETS, NOWHERE, selectAmong, type Counted, type Steps } from "@/lib/statistics/select-quantiles";

/** Of one row: how much ground each value of the channel stands for. A log's readings are multiples of its own rounding. */
export interface RowTally {
  /** One entry a value, ascending; steps without a reading are left as 0. */
  steps: Steps;
  counts: Uint32Array;
  sums: Float64Array;
  /** Weighted median of the row's deviations from the other rows; NaN without any. */
  typicalDeviation: number;
}

const ROWS_AT_ONCE = 8;
/** Deviations are halves of the log's rounding; those beyond so many count as that many. */
const DEVIATION_STEPS = BUCKETS / 2;

/** How values become places in a tally; null where they are too many or no multiples of a step. */
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
  const members = membersOf(placed);
  const room = createRoom(members.length);
  const made: T[] = [];
  for (let first = 0; first < channel.rows; first += ROWS_AT_ONCE) {
    const count = Math.min(ROWS_AT_ONCE, channel.rows - first);
    if (!tallyBlock(channel, given, { scale, members, room, first, count })) return null;
    for (let k = 0; k < count; k++) made.push(describe(tallyOf(room, members.length, k), first + k + 1));
  }
  return made;
}

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

interface Room {
  counts: Uint32Array;
  sums: Float64Array;
  values: Float32Array;
  firsts: Float32Array;
  lasts: Float32Array;
  deviations: Float32Array;
  weights: Float32Array;
  bucketOf: Uint16Array;
  deviationSums: Float64Array;
}

function createRoom(members: number): Room {
  const steps = ROWS_AT_ONCE * BUCKETS;
  return {
    counts: new Uint32Array(steps),
    sums: new Float64Array(steps),
    values: new Float32Array(steps),
    firsts: new Float32Array(steps),
    lasts: new Float32Array(steps),
    deviations: new Float32Array(ROWS_AT_ONCE * members),
    weights: new Float32Array(ROWS_AT_ONCE * members),
    bucketOf: new Uint16Array(ROWS_AT_ONCE * members),
    deviationSums: new Float64Array(steps),
  };
}

interface Block {
  scale: Scale;
  members: Int32Array;
  room: Room;
  first: number;
  count: number;
}

/** kernel: one walk over a block of rows. False where two values fall on one step, or a value beside the scale. */
function tallyBlock(
  channel: ResolvedChannel,
  { distances, middles }: { distances: Float32Array; middles: MiddleReadings },
  { scale, members, room, first, count }: Block,
): boolean {
  const { counts, sums, values, firsts, lasts, deviations, weights, bucketOf, deviationSums } = room;
  counts.fill(0);
  sums.fill(0);
  deviationSums.fill(0);
  const readings = channel.values;
  const { medians } = middles;
  const { min, perUnit } = scale;
  const { length } = members;
  let mixed = 0;
  for (let i = 0; i < length; i++) {
    const record = members[i]!;
    const from = record * channel.rows + first;
    const at = medians[4 * record]!;
    for (let k = 0, place = i, base = 0; k < count; k++, place += length, base += BUCKETS) {
      const value = readings[from + k]!;
      const weight = distances[from + k]!;
      const step = base + (((value - min) * perUnit + 0.5) | 0);
      if (value !== value) {
        bucketOf[place] = NOWHERE;
        continue;
      }
      if (counts[step] === 0) {
        values[step] = value;
        firsts[step] = 0;
      }
      mixed |= +(values[step] !== value);
      counts[step]!++;
      const deviation = value - medians[4 * record + 1 + +(value >= at) + +(value > at)]!;
      if (!(weight > 0)) {
        bucketOf[place] = NOWHERE;
        continue;
      }
      if (firsts[step] === 0) firsts[step] = weight;
      lasts[step] = weight;
      sums[step]! += weight;
      deviations[place] = deviation;
      weights[place] = weight;
      const steps = deviation * 2 * perUnit + DEVIATION_STEPS + 0.25;
      const bucket = deviation === deviation ? (steps > 0 ? (steps < BUCKETS ? steps | 0 : BUCKETS - 1) : 0) : NOWHERE;
      bucketOf[place] = bucket;
      if (bucket !== NOWHERE) deviationSums[base + bucket]! += weight;
    }
  }
  return mixed === 0;
}

function tallyOf(room: Room, members: number, k: number): RowTally {
  const steps = <T extends { subarray(from: number, end: number): T }>(all: T) =>
    all.subarray(k * BUCKETS, (k + 1) * BUCKETS);
  const series = <T extends { subarray(from: number, end: number): T }>(all: T) =>
    all.subarray(k * members, (k + 1) * members);
  const counted: Counted = { bucketOf: series(room.bucketOf), sums: steps(room.deviationSums) };
  const { quantiles } = selectAmong(series(room.deviations), series(room.weights), counted, [0.5]);
  return {
    steps: {
      values: steps(room.values),
      firsts: steps(room.firsts),
      lasts: steps(room.lasts),
      mixed: NO_STEP_IS_MIXED,
    },
    counts: steps(room.counts),
    sums: steps(room.sums),
    typicalDeviation: quantiles[0] ?? NaN,
  };
}

const NO_STEP_IS_MIXED = new Uint8Array(BUCKETS);
