import type { LogChannel } from "@/lib/logs/machine-log";

/** How numbers become codes 1 .. 65535 in the red and green bytes of a value tile: value = offset + code * step. */
export interface ValueScale {
  minimum: number;
  maximum: number;
  /** The quantum. */
  step: number;
  offset: number;
  redFactor: number;
  greenFactor: number;
}

const GREATEST_CODE = 65535;

/** The log's own rounding, or the finest that 65,535 codes allow. A channel without a single value gets 0 .. 0. */
export function valueScale(channel: Pick<LogChannel, "values" | "resolution">): ValueScale {
  let minimum = Infinity;
  let maximum = -Infinity;
  for (const value of channel.values) {
    if (value < minimum && value > -Infinity) minimum = value;
    if (value > maximum && value < Infinity) maximum = value;
  }
  if (minimum > maximum) return scaleBetween(0, 0, channel.resolution);
  return scaleBetween(minimum, maximum, channel.resolution);
}

/** The scale of a channel whose range is known already. */
export function scaleBetween(minimum: number, maximum: number, resolution: number | null): ValueScale {
  const step = Math.max(resolution ?? 0, (maximum - minimum) / (GREATEST_CODE - 1)) || 1;
  return { minimum, maximum, step, offset: minimum - step, redFactor: 256 * step, greenFactor: step };
}

/** 1 .. 65535, the nearest code to a value; 0 for a missing one. Values beyond the scale take its end. */
export function codeOf(value: number, { offset, step }: ValueScale): number {
  if (Number.isNaN(value)) return 0;
  return Math.min(GREATEST_CODE, Math.max(1, Math.round((value - offset) / step)));
}

/** The value of a code; NaN for 0. Within half a step of what was encoded. */
export function valueOfCode(code: number, { offset, step }: ValueScale): number {
  return code === 0 ? NaN : offset + code * step;
}
