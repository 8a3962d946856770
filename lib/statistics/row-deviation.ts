import { medianOfOthers, middleReadings } from "@/lib/statistics/middle-readings";
import { median } from "@/lib/statistics/median";
import { robustSpread } from "@/lib/statistics/median-absolute-deviation";

/** Fewer rows than this have no "other rows" worth comparing with. */
export const MIN_ROWS_TO_RANK = 5;

/**
 * Each reading less the median of the other rows' readings of the same record: what is left belongs to the row, whatever
 * ground the machine stood on. Row-major by record like the input; NaN where the row or all others are missing.
 */
export function deviationFromOthers(values: Float32Array, rows: number): Float32Array {
  const middles = middleReadings(values, rows);
  const deviations = new Float32Array(values.length);
  for (let place = 0; place < values.length; place++) {
    const value = values[place]!;
    deviations[place] = value - medianOfOthers(middles, Math.floor(place / rows), value);
  }
  return deviations;
}

export interface RowScores {
  /** Typical deviation of each row from its neighbours, less the median over rows; NaN where the row has no reading. */
  deviation: Float64Array;
  /** Robust z of each row; null where it cannot be given. */
  z: (number | null)[];
  /** Rows (from 1) compared among themselves because both sides of the machine show the same step. */
  wheelTrackRows: number[];
  /** Why there is no z at all, or null. */
  reason: string | null;
}

export const Z_LIMIT = 3.5;
/** What both of two mirror rows must reach to count as a pair: soil seldom favours both sides alike. */
const PAIR_LIMIT = 2;

/**
 * Robust z of each row (Iglewicz & Hoaglin 1993): its median deviation from the other rows, less the median over rows,
 * over 1.4826 MAD over rows; MAD 0 falls back to 1.2533 times the mean absolute deviation, and that 0 to "no spread".
 *
 * Rows that stand out together and evenly about the centre line are where tractor or carrying wheels ran; they are
 * compared within their own group: their z counts from the group's median (of two rows: from the one nearer the rest),
 * with the same spread. All other rows keep the plain z. More rows side by side than a wheel is wide (`maxTrackRows`), a
 * block across the centre line, or more than two rows at either rim are no wheel track: a band of residue driven along would
 * look the same.
 */
export function scoreRows(medianDeviations: ArrayLike<number>, options: { maxTrackRows?: number } = {}): RowScores {
  const centre = median(medianDeviations);
  const deviation = Float64Array.from(medianDeviations, (value) => value - centre);
  const none = (reason: string) => ({ deviation, z: Array.from(deviation, () => null), wheelTrackRows: [], reason });
  const known = deviation.filter((value) => Number.isFinite(value)).length;
  if (known < MIN_ROWS_TO_RANK) return none(`only ${known} rows have readings; ranking needs ${MIN_ROWS_TO_RANK}`);
  const spread = robustSpread(deviation);
  if (spread === null) return none("no spread: every row reads the same");
  const plain = Array.from(deviation, (value) => (Number.isFinite(value) ? value / spread : null));
  const groups = findWheelTracks(deviation, spread, options.maxTrackRows ?? 3);
  const z = [...plain];
  for (const group of groups) {
    const reference = groupReference(group.map((row) => deviation[row]!));
    for (const row of group) z[row] = (deviation[row]! - reference) / spread;
  }
  const wheelTrackRows = groups.flat().map((row) => row + 1);
  return { deviation, z, wheelTrackRows: wheelTrackRows.sort((a, b) => a - b), reason: null };
}

/** The median of three or more; of two, the one nearer zero, so that one of a pair going bad still stands out. */
function groupReference(deviations: number[]): number {
  const [first = NaN, second = NaN] = deviations;
  if (deviations.length > 2) return median(deviations);
  return Math.abs(first) < Math.abs(second) ? first : second;
}

/**
 * Groups (row indices from 0) of rows that stand out the same way as their mirror row: one group for high rows, one for low.
 * A pair must agree in sign, both beyond a score of 2, the smaller at least half the larger (or lie beside such a pair: a
 * wheel is often two rows wide); a group counts where one of its rows is beyond the limit.
 */
function findWheelTracks(deviation: Float64Array, spread: number, maxTrackRows: number): number[][] {
  const last = deviation.length - 1;
  const half = Math.floor(deviation.length / 2);
  const pairs = Array.from({ length: half }, (_, row) => pairKind(deviation[row]!, deviation[last - row]!, spread));
  const member = pairs.map((kind, row) => {
    if (kind === null) return false;
    const beside = [pairs[row - 1], pairs[row + 1]].some((other) => other?.even === true && other.high === kind.high);
    return kind.even || beside;
  });
  const groups: Record<"high" | "low", number[]> = { high: [], low: [] };
  for (let first = 0; first < half; first++) {
    let end = first;
    while (end < half && member[end]) end++;
    if (end === first) continue;
    const atTheRim = first === 0 && end > 2;
    if (end - first <= maxTrackRows && end < half && !atTheRim) {
      for (let row = first; row < end; row++) groups[pairs[row]!.high ? "high" : "low"].push(row, last - row);
    }
    first = end;
  }
  return Object.values(groups).filter((group) => group.some((row) => Math.abs(deviation[row]!) > Z_LIMIT * spread));
}

function pairKind(left: number, right: number, spread: number): { high: boolean; even: boolean } | null {
  const smaller = Math.min(Math.abs(left), Math.abs(right));
  const larger = Math.max(Math.abs(left), Math.abs(right));
  if (!(left * right > 0) || smaller <= PAIR_LIMIT * spread) return null;
  return { high: left > 0, even: smaller >= 0.5 * larger };
}
