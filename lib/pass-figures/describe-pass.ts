import { gatherPass, type ChannelOnGround } from "@/lib/pass-figures/pass-readings";
import type { Pass } from "@/lib/logs/placed-log";
import type { PassStatisticsItem } from "@/lib/schemas/pass-figures";
import { finiteOrNull } from "@/lib/statistics/finite-or-null";
import { atLimitFromN, contactLostShare, distanceShare, underTargetBelowN } from "@/lib/statistics/row-shares";
import type { RowSeries } from "@/lib/statistics/row-series";
import { sortWeighted } from "@/lib/statistics/sort-weighted";
import { weightedMean } from "@/lib/statistics/weighted-mean";
import { weightedQuantileSorted } from "@/lib/statistics/weighted-quantile";
import { weightedSd } from "@/lib/statistics/weighted-sd";

/** What all rows together did in one pass, each reading weighted by the distance its row travelled. */
export function describePass(from: ChannelOnGround, pass: Pass): PassStatisticsItem {
  const series = gatherPass(from, pass);
  const { values, weightsM } = series;
  const sorted = sortWeighted(values, weightsM);
  const at = (p: number) => finiteOrNull(weightedQuantileSorted(sorted, p));
  return {
    pass: pass.pass,
    headingDeg: finiteOrNull(pass.headingDeg),
    headland: pass.headland,
    lengthM: pass.lengthM,
    records: pass.records,
    startedAt: startOf(from, pass),
    speedMps: finiteOrNull(passSpeed(from, pass)),
    n: values.length,
    distanceM: weightsM.reduce((sum, weight) => sum + weight, 0) / from.channel.rows,
    mean: finiteOrNull(weightedMean(values, weightsM)),
    sd: finiteOrNull(weightedSd(values, weightsM)),
    p05: at(0.05),
    p25: at(0.25),
    p50: at(0.5),
    p75: at(0.75),
    p95: at(0.95),
    ...sharesOf(from, series),
  };
}

function startOf({ placed }: ChannelOnGround, { startedAtMs }: Pass): string | null {
  if (placed.log.timeIsRelative || !Number.isFinite(startedAtMs)) return null;
  return new Date(startedAtMs).toISOString();
}

/** Metres over seconds where both are known, else the mean of the speeds. */
function passSpeed({ placed }: ChannelOnGround, pass: Pass): number {
  const seconds = (pass.endedAtMs - pass.startedAtMs) / 1000;
  if (seconds > 0) return pass.lengthM / seconds;
  const speeds = placed.speedMps.subarray(pass.first, pass.first + pass.records);
  return weightedMean(speeds, new Float32Array(speeds.length).fill(1));
}

/** Shares of the distance; null where the channel or the machine has no such limit. */
function sharesOf({ placed, channel }: ChannelOnGround, series: RowSeries) {
  const below = underTargetBelowN(placed, channel);
  const limit = atLimitFromN(placed, channel);
  return {
    shareUnderTarget: below === null ? null : distanceShare(series, (value) => value < below),
    shareAtLimit: limit === null ? null : distanceShare(series, (value) => value >= limit),
    shareContactLost: contactLostShare(series, channel),
  };
}
