import { axialDifferenceDeg, circularMean, turnDegrees } from "@/lib/geo/circular-mean";
import type { Pass } from "@/lib/logs/placed-log";
import { compareGroups } from "@/lib/pass-figures/compare-groups";
import { eachReading, type ChannelOnGround } from "@/lib/pass-figures/pass-readings";
import { addReading, emptySums } from "@/lib/pass-figures/resample-passes";
import { mainAxisDeg } from "@/lib/passes/main-axis";
import type { PassComparison } from "@/lib/schemas/pass-figures";
import { finiteOrNull } from "@/lib/statistics/finite-or-null";
import { sortWeighted } from "@/lib/statistics/sort-weighted";
import { weightedQuantileSorted } from "@/lib/statistics/weighted-quantile";

/** Passes further off the main direction belong to neither way along it. */
const OFF_AXIS_DEG = 20;

interface Grouping {
  by: PassComparison["by"];
  keys: readonly string[];
  against: readonly [number, number];
  /** Group of a reading, as a place in `keys`; -1 for none. */
  partOf: (pass: Pass, record: number) => number;
}

function sumGroups(from: ChannelOnGround, { keys, partOf }: Grouping) {
  const { passes } = from.placed;
  const values = emptySums(passes.length, keys.length);
  const speeds = emptySums(passes.length, keys.length);
  passes.forEach((pass, p) => {
    eachReading(from, pass, (value, weightM, record) => {
      const part = partOf(pass, record);
      if (part < 0) return;
      addReading(values, p, part, value, weightM);
      const speedMps = from.placed.speedMps[record]!;
      if (Number.isFinite(speedMps)) addReading(speeds, p, part, speedMps, weightM);
    });
  });
  return { values, speeds };
}

/** Passes driven one way along the main direction against those driven the other way; headland passes are left out. */
export function compareDirections(from: ChannelOnGround): PassComparison {
  const inside = from.placed.passes.filter((pass) => !pass.headland);
  const axis = mainAxisDeg(inside);
  const wayOf = (pass: Pass) => {
    if (axis === null || pass.headland || !(axialDifferenceDeg(pass.headingDeg, axis) <= OFF_AXIS_DEG)) return -1;
    return Math.abs(turnDegrees(axis, pass.headingDeg)) < 90 ? 0 : 1;
  };
  const grouping: Grouping = { by: "direction", keys: ["along", "against"], against: [0, 1], partOf: wayOf };
  const headingOf = (part: number) => {
    const driven = inside.filter((pass) => wayOf(pass) === part).map((pass) => pass.headingDeg);
    return circularMean(driven)?.meanDeg ?? null;
  };
  return compareGroups({
    ...grouping,
    ...sumGroups(from, grouping),
    rows: from.channel.rows,
    extras: (part) => ({ headingDeg: headingOf(part) }),
  });
}

/** Headland passes against those inside the field. */
export function comparePlaces(from: ChannelOnGround): PassComparison {
  const grouping: Grouping = {
    by: "place",
    keys: ["inside", "headland"],
    against: [1, 0],
    partOf: (pass) => (pass.headland ? 1 : 0),
  };
  return compareGroups({ ...grouping, ...sumGroups(from, grouping), rows: from.channel.rows });
}

/** The slowest third of the distance, the middle one and the fastest; each pass lends its metres to each. */
export function compareSpeeds(from: ChannelOnGround): PassComparison {
  const { placed } = from;
  const metres = new Float32Array(placed.log.records);
  for (const pass of placed.passes) eachReading(from, pass, (_, weightM, record) => (metres[record]! += weightM));
  const sorted = sortWeighted(placed.speedMps, metres);
  const edges = [0, 1 / 3, 2 / 3, 1].map((p) => weightedQuantileSorted(sorted, p));
  const [least = NaN, low = NaN, high = NaN, most = NaN] = edges;
  const partOf = (_: Pass, record: number) => {
    const speed = placed.speedMps[record]!;
    return Number.isFinite(speed) && low < high ? +(speed >= low) + +(speed >= high) : -1;
  };
  const grouping: Grouping = { by: "speed", keys: ["slow", "middle", "fast"], against: [2, 0], partOf };
  const bounds: [number, number][] = [
    [least, low],
    [low, high],
    [high, most],
  ];
  const compared = compareGroups({
    ...grouping,
    ...sumGroups(from, grouping),
    rows: from.channel.rows,
    extras: (part) => {
      const [slowest, fastest] = bounds[part]!;
      return finiteOrNull(slowest) === null || finiteOrNull(fastest) === null ? {} : { speedBetweenMps: bounds[part]! };
    },
  });
  return low < high ? compared : { ...compared, reason: "The speed never changed, or is not known." };
}
