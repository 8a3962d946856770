import { rowSpeed } from "@/lib/channels/row-speed";
import { compareGroups } from "@/lib/pass-figures/compare-groups";
import { eachReading, type ChannelOnGround } from "@/lib/pass-figures/pass-readings";
import {
  addReading,
  emptySums,
  LEAST_PASSES,
  partInterval,
  partMeans,
  resamplePasses,
} from "@/lib/pass-figures/resample-passes";
import type { PassComparison } from "@/lib/schemas/pass-figures";
import { finiteOrNull } from "@/lib/statistics/finite-or-null";

/** A turn is where the outermost row runs this much of the middle speed faster than the innermost. Common practice, no source. */
const TURN_SHARE = 0.1;
const LEAST_ROWS = 3;
const KEYS = ["straight", "inner", "between", "outer"] as const;

/**
 * Inner against outer rows while the machine turns with its rows down: thirds of the rows counted from the inside of the turn.
 * A row that is always high would look like the inside of a turn where all turns go one way, so each reading is also held
 * against what its own row reads going straight (`fromStraight`).
 */
export function compareTurns(from: ChannelOnGround): PassComparison {
  const { placed, channel } = from;
  const { rows } = channel;
  if (!channel.perRow || rows < LEAST_ROWS) {
    return nothing(`Inner and outer rows need a channel logged for at least ${LEAST_ROWS} rows.`);
  }
  const speeds = rowSpeed(placed).values;
  const leanOf = turnLean(placed.speedMps, speeds, rows);
  const sums = emptySums(placed.passes.length, KEYS.length);
  const speedSums = emptySums(placed.passes.length, KEYS.length);
  const partOf = (record: number, row: number) => partOfRow(leanOf(record), row, rows);
  const straight = straightMeans(from, partOf);
  const residuals = emptySums(placed.passes.length, KEYS.length);
  placed.passes.forEach((pass, p) => {
    eachReading(from, pass, (value, weightM, record, row) => {
      const part = partOf(record, row);
      addReading(sums, p, part, value, weightM);
      const speedMps = speeds[record * rows + row]!;
      if (Number.isFinite(speedMps)) addReading(speedSums, p, part, speedMps, weightM);
      const usual = straight[row]!;
      if (Number.isFinite(usual)) addReading(residuals, p, part, value - usual, weightM);
    });
  });
  const compared = compareGroups({
    by: "turn",
    keys: KEYS,
    values: sums,
    speeds: speedSums,
    rows,
    against: [3, 1],
  });
  const beyond = partMeans(residuals);
  const turned = compared.groups.find((group) => group.key === "inner")?.passes ?? 0;
  const drawn = turned >= LEAST_PASSES ? resamplePasses(residuals) : null;
  const groups = compared.groups.map((group) => {
    const part = KEYS.findIndex((key) => key === group.key);
    // A third of the rows swept this distance, not all of them.
    const distanceM = part === 0 ? group.distanceM : group.distanceM * (rows / rowsIn(part, rows));
    if (part === 0) return { ...group, distanceM };
    const fromStraightInterval = drawn && partInterval(drawn, part);
    return { ...group, distanceM, fromStraight: finiteOrNull(beyond[part]!), fromStraightInterval };
  });
  if (turned === 0) return { ...compared, groups, reason: "No turn was driven with the rows down." };
  return { ...compared, groups };
}

function nothing(reason: string): PassComparison {
  return { by: "turn", groups: [], difference: null, reason };
}

function rowsIn(part: number, rows: number): number {
  const third = Math.floor(rows / 3);
  return part === 2 ? rows - 2 * third : third;
}

/** 1 where the machine turns right (its right rows are the inner ones), -1 left, 0 going straight. */
function turnLean(speedMps: Float32Array, rowSpeeds: Float32Array, rows: number): (record: number) => number {
  return (record) => {
    const step = rowSpeeds[record * rows]! - rowSpeeds[record * rows + rows - 1]!;
    return Math.abs(step) >= TURN_SHARE * speedMps[record]! ? Math.sign(step) : 0;
  };
}

function partOfRow(lean: number, row: number, rows: number): number {
  if (lean === 0) return 0;
  const third = Math.floor(rows / 3);
  const fromInside = lean > 0 ? rows - 1 - row : row;
  if (fromInside < third) return 1;
  return fromInside >= rows - third ? 3 : 2;
}

/** What each row reads going straight, weighted by distance. */
function straightMeans(from: ChannelOnGround, partOf: (record: number, row: number) => number): Float64Array {
  const sums = emptySums(1, from.channel.rows);
  for (const pass of from.placed.passes) {
    eachReading(from, pass, (value, weightM, record, row) => {
      if (partOf(record, row) === 0) addReading(sums, 0, row, value, weightM);
    });
  }
  return partMeans(sums);
}
