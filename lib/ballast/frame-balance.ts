import { forceChannel, GRAVITY_MPS2 } from "@/lib/channels/opener-resistance";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { Frame } from "@/lib/machines/machine";
import { sortWeighted } from "@/lib/statistics/sort-weighted";
import { weightedQuantileSorted } from "@/lib/statistics/weighted-quantile";

export interface FrameBalance {
  state: "enough" | "short" | "unknown";
  /** What would have to be known, in plain words; empty where the balance could be struck. */
  missing: string[];
  /** Load on the frame's wheels less the least they must keep; over the distance worked. */
  headroomN: { p05: number; p50: number } | null;
  /** Share (0..1) of the area worked with the wheels carrying under 0.5 % of what they carry with the openers up. */
  shareLiftedM2: number | null;
  /** Equal force on every row at which the wheels come off the ground. */
  liftOffForcePerRowN: number | null;
  /** Records of every stretch with the frame lifted, in the log's order. */
  lifts: Lift[];
}

/** A stretch of one pass with the frame lifted. */
export interface Lift {
  firstRecord: number;
  lastRecord: number;
  lengthM: number;
}

/** The frame counts as lifted when its wheels carry less than this share of what they carry with the openers up. */
const LIFTED_BELOW_SHARE = 0.005;
/** Lifted on more of the area than this is short of weight, even if the 5th percentile of the headroom is above 0. */
const SHORT_FROM_SHARE = 0.01;

/** Moment of frame and ballast about the hitch pin, N m. Row units carry themselves and count for nothing. */
export function frameMomentNm(frame: Frame): number {
  const ballast = frame.ballast.reduce((sum, piece) => sum + piece.massKg * piece.behindHitchM, 0);
  return GRAVITY_MPS2 * (frame.massKg * frame.behindHitchM + ballast);
}

/**
 * Load on the frame's wheels, N: (sum W x - sum F x) / x wheels, about the hitch pin (statics; each row pushed down by F
 * pushes the frame up by F). `rowMomentNm` is the sum over rows of force times distance behind the pin.
 */
export function wheelLoadN(frame: Frame, rowMomentNm: number): number {
  return (frameMomentNm(frame) - rowMomentNm) / frame.wheelsBehindHitchM;
}

/** Equal force on each of `rows` rows at which the frame's wheels carry nothing. */
export function liftOffForceN(frame: Frame, rows: number): number {
  return frameMomentNm(frame) / (rows * frame.rowsBehindHitchM);
}

/** Wheel load under which the frame counts as lifted. */
export function liftedBelowN(frame: Frame): number {
  return LIFTED_BELOW_SHARE * wheelLoadN(frame, 0);
}

/** Strikes the frame's balance at every working record: how much weight was left, and where there was none. */
export function measureFrameBalance(placed: PlacedLog, distances: Float32Array): FrameBalance {
  const frame = placed.machine?.frame;
  const downforce = forceChannel(placed, "downforce");
  const missing = [
    ...(frame ? [] : ["the weight of the frame, where it and its wheels sit, and the least load the wheels must keep"]),
    ...(downforce ? [] : ["the force applied to each row (in newtons)"]),
  ];
  const liftOffForcePerRowN = frame ? liftOffForceN(frame, placed.geometry.rows) : null;
  const unknown = { headroomN: null, shareLiftedM2: null, liftOffForcePerRowN, lifts: [] };
  if (!frame || !downforce) return { state: "unknown", missing, ...unknown };
  const loads = wheelLoads(placed, frame, downforce.values);
  const areas = workedAreas(placed, distances);
  const sorted = sortWeighted(
    loads.map((load) => load - frame.minWheelLoadN),
    areas,
  );
  if (sorted.values.length === 0) return { state: "unknown", missing: ["readings of force while working"], ...unknown };
  const headroomN = { p05: weightedQuantileSorted(sorted, 0.05), p50: weightedQuantileSorted(sorted, 0.5) };
  const lifted = loads.map((load) => (Number.isNaN(load) ? NaN : load <= liftedBelowN(frame) ? 1 : 0));
  const lift = measureLift(placed, lifted, areas);
  const short = headroomN.p05 < 0 || lift.share >= SHORT_FROM_SHARE;
  return {
    state: short ? "short" : "enough",
    missing: [],
    headroomN,
    shareLiftedM2: lift.share,
    liftOffForcePerRowN,
    lifts: lift.lifts,
  };
}

/** Wheel load of every record; NaN outside passes and where fewer than half the rows have a force (the rest take the mean). */
export function wheelLoads(placed: PlacedLog, frame: Frame, forces: Float32Array): Float32Array {
  const { rows, forwardM } = placed.geometry;
  const loads = new Float32Array(placed.log.records).fill(NaN);
  for (let record = 0; record < loads.length; record++) {
    if (placed.passOf[record] === 0) continue;
    let moment = 0;
    let known = 0;
    for (let row = 0; row < rows; row++) {
      const force = forces[record * rows + row]!;
      if (Number.isNaN(force)) continue;
      moment += force * (frame.rowsBehindHitchM - forwardM[row]!);
      known++;
    }
    if (known * 2 >= rows) loads[record] = wheelLoadN(frame, (moment * rows) / known);
  }
  return loads;
}

function workedAreas(placed: PlacedLog, distances: Float32Array): Float32Array {
  const { rows, widthM } = placed.geometry;
  return Float32Array.from({ length: placed.log.records }, (_, record) => {
    let area = 0;
    for (let row = 0; row < rows; row++) area += distances[record * rows + row]! * widthM[row]!;
    return area;
  });
}

function measureLift(placed: PlacedLog, lifted: Float32Array, areas: Float32Array): { share: number; lifts: Lift[] } {
  let liftedM2 = 0;
  let total = 0;
  let open: Lift | null = null;
  const lifts: Lift[] = [];
  const widthM = placed.geometry.widthM.reduce((sum, width) => sum + width, 0);
  for (let record = 0; record < lifted.length; record++) {
    if (Number.isNaN(lifted[record]!)) continue;
    total += areas[record]!;
    if (lifted[record] === 0) {
      open = null;
      continue;
    }
    liftedM2 += areas[record]!;
    const follows = open?.lastRecord === record - 1 && placed.passOf[record] === placed.passOf[record - 1];
    if (!open || !follows) {
      open = { firstRecord: record, lastRecord: record, lengthM: 0 };
      lifts.push(open);
    }
    open.lastRecord = record;
    open.lengthM += areas[record]! / widthM;
  }
  return { share: total > 0 ? liftedM2 / total : 0, lifts };
}
