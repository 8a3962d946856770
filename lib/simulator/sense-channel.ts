import type { SeededRandom } from "@/lib/simulator/seeded-random";

/** How a sensor and its logger change a true value on the way into the file. */
export interface Sensor {
  rows: number;
  recordIntervalS: number;
  latencyS: number;
  noise: number;
  /** Readings outside these are held at them (a load pin shows 0, not a pull; a force is never above its limit). */
  lowest: number;
  highest: number;
  /** Where each row's sensor has its zero, in the channel's unit. */
  zero: number[];
  /** Zero drift in the channel's unit per hour, one entry a row. */
  driftPerHour: number[];
  resolution: number;
  missingShare: number;
  random: SeededRandom;
}

/** What the log holds of a true channel: late, noisy, held in range, drifting, rounded, with gaps. NaN stays NaN. */
export function senseChannel(truth: Float32Array, timeS: Float64Array, sensor: Sensor): Float32Array {
  const late = delayChannel(truth, sensor);
  const stored = new Float32Array(truth.length);
  for (let index = 0; index < truth.length; index += 1) {
    const row = index % sensor.rows;
    const noisy = (late[index] ?? NaN) + sensor.noise * sensor.random.normal();
    const hours = (timeS[(index - row) / sensor.rows] ?? 0) / 3600;
    const held = Math.min(sensor.highest, Math.max(sensor.lowest, noisy));
    const shift = (sensor.zero[row] ?? 0) + (sensor.driftPerHour[row] ?? 0) * hours;
    stored[index] = roundTo(held + shift, sensor.resolution);
    if (sensor.missingShare > 0 && sensor.random.uniform() < sensor.missingShare) stored[index] = NaN;
  }
  return stored;
}

/** The channel as it was `latencyS` earlier, straight lines between records. */
function delayChannel(truth: Float32Array, { rows, recordIntervalS, latencyS }: Sensor): Float32Array {
  if (latencyS === 0) return truth;
  const shift = latencyS / recordIntervalS;
  const whole = Math.floor(shift);
  const part = shift - whole;
  const late = new Float32Array(truth.length);
  for (let index = 0; index < truth.length; index += 1) {
    const row = index % rows;
    const newer = truth[Math.max(row, index - whole * rows)] ?? NaN;
    const older = truth[Math.max(row, index - (whole + 1) * rows)] ?? NaN;
    late[index] = part === 0 ? newer : newer * (1 - part) + older * part;
  }
  return late;
}

/** Nearest multiple; adding 0 turns -0 into 0. */
function roundTo(value: number, step: number): number {
  return step > 0 ? Math.round(value / step) * step + 0 : value;
}
