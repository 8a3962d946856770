import { distanceAlongPasses } from "@/lib/cleaning/rule-mask";
import type { Pass } from "@/lib/logs/placed-log";
import { eachReading, type ChannelOnGround } from "@/lib/pass-figures/pass-readings";
import {
  addReading,
  emptySums,
  LEAST_PASSES,
  partInterval,
  partMeans,
  passesIn,
  resamplePasses,
} from "@/lib/pass-figures/resample-passes";
import type { RampMetre, RampsBody } from "@/lib/schemas/pass-figures";
import { finiteOrNull } from "@/lib/statistics/finite-or-null";
import { median } from "@/lib/statistics/median";

const MOST_REACH_M = 30;
const LEAST_REACH_M = 3;
/** Metres in a row whose intervals must hold 0 before a ramp is said to be over. */
const SETTLED_METRES = 3;

/**
 * How a channel comes up to what the middle of the pass reads, metre by metre from the start, and how it leaves it before the
 * end. All passes are laid on each other at 0 m; each counts by its difference from its own middle, so that passes on other
 * ground blur nothing. Only passes three times as long as the reach have a middle.
 */
export function passRamps(from: ChannelOnGround): RampsBody {
  const { passes } = from.placed;
  const { channel } = from;
  const reachM = reachOf(passes);
  const long = reachM === 0 ? [] : passes.filter((pass) => pass.lengthM >= 3 * reachM);
  const common = { channel: channel.id, unit: channel.unit, reachM, tooShort: passes.length - long.length };
  const sums = sumRamps(from, long, reachM);
  const middles = emptySums(1, 1);
  sums.middles.forEach((middle, p) => addReading(middles, 0, 0, middle || 0, middle === middle ? sums.middleM[p]! : 0));
  return {
    ...common,
    passes: long.length,
    middleMean: finiteOrNull(partMeans(middles)[0]!),
    start: rampEnd(sums.start, reachM),
    end: rampEnd(sums.end, reachM),
    reason: whyNoInterval(long.length, reachM),
  };
}

/** 30 m, or a third of the middling pass where passes are shorter. */
function reachOf(passes: readonly Pass[]): number {
  const reach = Math.floor(Math.min(MOST_REACH_M, median(passes.map((pass) => pass.lengthM)) / 3));
  return reach >= LEAST_REACH_M ? reach : 0;
}

function whyNoInterval(passes: number, reachM: number): string | null {
  if (reachM === 0) return `Passes are shorter than ${3 * LEAST_REACH_M} m: they are all start and end.`;
  if (passes >= LEAST_PASSES) return null;
  return `An interval needs ${LEAST_PASSES} passes of at least ${3 * reachM} m; this log has ${passes}.`;
}

function endSums(passes: number, metres: number) {
  return {
    values: emptySums(passes, metres),
    differences: emptySums(passes, metres),
    speeds: emptySums(passes, metres),
  };
}
type EndSums = ReturnType<typeof endSums>;

function sumRamps(from: ChannelOnGround, passes: readonly Pass[], reachM: number) {
  const alongM = distanceAlongPasses(from.placed);
  const start = endSums(passes.length, reachM);
  const end = endSums(passes.length, reachM);
  const middleSums = emptySums(passes.length, 1);
  const isMiddle = (pass: Pass, record: number) =>
    alongM[record]! >= reachM && pass.lengthM - alongM[record]! >= reachM;
  passes.forEach((pass, p) => {
    eachReading(from, pass, (value, weightM, record) => {
      if (isMiddle(pass, record)) addReading(middleSums, p, 0, value, weightM);
    });
  });
  const middles = middleSums.sums.map((sum, p) => sum / middleSums.weights[p]!);
  passes.forEach((pass, p) => {
    eachReading(from, pass, (value, weightM, record) => {
      const fromStart = Math.floor(alongM[record]!);
      const fromEnd = Math.floor(Math.max(0, pass.lengthM - alongM[record]!));
      const add = (into: EndSums, metre: number) => {
        if (metre >= reachM) return;
        addReading(into.values, p, metre, value, weightM);
        if (middles[p] === middles[p]) addReading(into.differences, p, metre, value - middles[p]!, weightM);
        const speedMps = from.placed.speedMps[record]!;
        if (Number.isFinite(speedMps)) addReading(into.speeds, p, metre, speedMps, weightM);
      };
      add(start, fromStart);
      add(end, fromEnd);
    });
  });
  return { start, end, middles, middleM: middleSums.weights };
}

function rampEnd({ values, differences, speeds }: EndSums, reachM: number): RampsBody["start"] {
  const means = partMeans(values);
  const offs = partMeans(differences);
  const speedMeans = partMeans(speeds);
  const drawn = values.passes >= LEAST_PASSES ? resamplePasses(differences) : null;
  const metres: RampMetre[] = Array.from({ length: reachM }, (_, metre) => ({
    fromM: metre,
    passes: passesIn(differences, metre),
    mean: finiteOrNull(means[metre]!),
    difference: finiteOrNull(offs[metre]!),
    interval: drawn && partInterval(drawn, metre),
    speedMps: finiteOrNull(speedMeans[metre]!),
  }));
  return { metres, settledAtM: settledAt(metres) };
}

function settledAt(metres: readonly RampMetre[]): number | null {
  const holdsZero = ({ interval }: RampMetre) => interval !== null && interval[0] <= 0 && interval[1] >= 0;
  const at = metres.findIndex((_, metre) => {
    const stretch = metres.slice(metre, metre + SETTLED_METRES);
    return stretch.length === SETTLED_METRES && stretch.every(holdsZero);
  });
  return at < 0 ? null : at;
}
