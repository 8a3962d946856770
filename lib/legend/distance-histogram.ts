import type { Histogram } from "@/lib/legend/class-edges";
import type { ValueDistribution } from "@/lib/legend/value-distribution";

/**
 * Metres of row in each bin of a histogram. A value logged in steps of `resolution` stands for all within half a step and is
 * shared out over the bins that these reach, so that steps and bins out of tune do not look like a comb.
 */
export function distanceHistogram(
  { offset, step, codes, distancesM }: ValueDistribution,
  { minimum, maximum, counts }: Histogram,
  resolution: number | null,
): number[] {
  const bins = new Array<number>(counts.length).fill(0);
  const width = (maximum - minimum) / counts.length;
  if (!(width > 0)) return bins.map((_, bin) => (bin === 0 ? distancesM.reduce((sum, metres) => sum + metres, 0) : 0));
  const half = (resolution ?? 0) / 2;
  codes.forEach((code, index) => {
    const value = offset + code * step;
    const from = Math.min(counts.length - 1e-9, Math.max(0, (value - half - minimum) / width));
    const to = Math.min(counts.length, Math.max(from, (value + half - minimum) / width));
    const span = to - from;
    if (span < 1e-9) bins[Math.floor(from)]! += distancesM[index]!;
    else
      for (let bin = Math.floor(from); bin < to; bin += 1) {
        bins[bin]! += (distancesM[index]! * (Math.min(to, bin + 1) - Math.max(from, bin))) / span;
      }
  });
  return bins;
}
