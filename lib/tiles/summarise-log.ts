import { histogramOf, type Histogram } from "@/lib/legend/class-edges";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import { heaviestCode, type DrawnChannel } from "@/lib/tiles/rasterise-tile";
import { valueScale } from "@/lib/tiles/value-scale";
import type { LogChannel } from "@/lib/logs/machine-log";

/** Which columns of the strip a pass fills: `from` up to and without `to`. */
export interface StripPass {
  pass: number;
  from: number;
  to: number;
}

/** A whole log at a glance: every pass end to end in time order, squeezed into few columns. */
export interface LogSummary {
  rows: number;
  columns: number;
  passes: StripPass[];
  /** Distance-weighted means, `values[row][column]`; NaN where nothing was logged. */
  values: Float32Array[];
  histogram: Histogram;
}

/** Summarises one channel of a log in about `columns` columns; every pass gets at least one. */
export function summariseLog(
  placed: PlacedLog,
  channel: DrawnChannel & Pick<LogChannel, "resolution">,
  columns: number,
): LogSummary {
  const passes = shareColumns(placed.passes, columns);
  const total = passes.at(-1)?.to ?? 0;
  const rows = channel.perRow ? channel.rows : 1;
  const values = Array.from({ length: rows }, () => new Float32Array(total).fill(NaN));
  passes.forEach((strip, i) => fillPass({ placed, channel, pass: placed.passes[i]!, strip, values }));
  const worked = readingsInPasses(placed.passes, channel);
  const { minimum, maximum } = valueScale({ values: worked, resolution: channel.resolution });
  const histogram = histogramInSteps(worked, { minimum, maximum, resolution: channel.resolution });
  return { rows, columns: total, passes, values, histogram };
}

interface Steps {
  minimum: number;
  maximum: number;
  resolution: number | null;
}

const BINS = 100;

/**
 * Counts readings in equal bins. A reading logged in steps stands for all values within half a step of it and is shared out
 * over the bins that these reach: counted at a point, steps and bins out of tune would look like a comb.
 */
function histogramInSteps(values: Float32Array, { minimum, maximum, resolution }: Steps): Histogram {
  const range = maximum - minimum;
  // Steps so coarse that there are fewer than bins get a bin each.
  if (!resolution || !(range > 0)) return histogramOf(values, minimum, maximum, BINS);
  const low = minimum - resolution / 2;
  const bins = Math.min(BINS, Math.round(range / resolution) + 1);
  const width = (range + resolution) / bins;
  const counts = new Float64Array(bins);
  for (const value of values) {
    if (!Number.isFinite(value)) continue;
    const from = Math.max(0, (value - resolution / 2 - low) / width);
    const to = Math.min(bins, (value + resolution / 2 - low) / width);
    for (let bin = Math.floor(from); bin < to; bin += 1) {
      counts[bin]! += (Math.min(to, bin + 1) - Math.max(from, bin)) / (to - from);
    }
  }
  return { minimum: low, maximum: low + bins * width, counts: Array.from(counts, Math.round) };
}

/** Without what was logged while lifted and turning, which would fill a class of its own. */
function readingsInPasses(passes: readonly Pass[], channel: DrawnChannel): Float32Array {
  const worked = new Float32Array(passes.reduce((sum, pass) => sum + pass.records, 0) * channel.rows);
  let at = 0;
  for (const { first, records } of passes) {
    worked.set(channel.values.subarray(first * channel.rows, (first + records) * channel.rows), at);
    at += records * channel.rows;
  }
  return worked;
}

function shareColumns(passes: readonly Pass[], columns: number): StripPass[] {
  const totalM = passes.reduce((sum, pass) => sum + pass.lengthM, 0) || 1;
  let from = 0;
  return passes.map(({ pass, lengthM }) => {
    const to = from + Math.max(1, Math.round((columns * lengthM) / totalM));
    const strip = { pass, from, to };
    from = to;
    return strip;
  });
}

interface PassFill {
  placed: PlacedLog;
  channel: DrawnChannel;
  pass: Pass;
  strip: StripPass;
  values: Float32Array[];
}

function fillPass({ placed, channel, pass, strip, values }: PassFill): void {
  const ends = cellEnds(placed, pass);
  const lengthM = ends.at(-1) ?? 0;
  const count = strip.to - strip.from;
  for (const [row, line] of values.entries()) {
    if (channel.codeCount) {
      fillCodes({ placed, channel, pass, strip, values }, { row, ends, codeCount: channel.codeCount });
      continue;
    }
    const sums = new Float64Array(count);
    const weights = new Float64Array(count);
    for (let step = 0; step < pass.records; step += 1) {
      const value = channel.values[(pass.first + step) * channel.rows + row]!;
      if (Number.isNaN(value)) continue;
      spreadOver({
        sums,
        weights,
        value,
        fromM: step > 0 ? ends[step - 1]! : 0,
        toM: ends[step]!,
        columnM: lengthM / count,
      });
    }
    for (let column = 0; column < count; column += 1) {
      if (weights[column]! > 0) line[strip.from + column] = sums[column]! / weights[column]!;
    }
  }
}

/** A row's columns of names: each carries the one over the longest part of it. */
function fillCodes(
  { channel, pass, strip, values }: PassFill,
  { row, ends, codeCount }: { row: number; ends: Float64Array; codeCount: number },
): void {
  const count = strip.to - strip.from;
  const sums = new Float64Array(count);
  const byCode = Array.from({ length: codeCount }, () => new Float64Array(count));
  for (let step = 0; step < pass.records; step += 1) {
    const value = channel.values[(pass.first + step) * channel.rows + row]!;
    const weights = byCode[value - 1];
    const fromM = step > 0 ? ends[step - 1]! : 0;
    if (weights) spreadOver({ sums, weights, value, fromM, toM: ends[step]!, columnM: (ends.at(-1) ?? 0) / count });
  }
  for (let column = 0; column < count; column += 1) values[row]![strip.from + column] = heaviestCode(byCode, column);
}

interface Spread {
  sums: Float64Array;
  weights: Float64Array;
  value: number;
  fromM: number;
  toM: number;
  columnM: number;
}

/** Gives each column the part of a cell's length that lies in it. */
function spreadOver({ sums, weights, value, fromM, toM, columnM }: Spread): void {
  if (!(toM > fromM)) return;
  const last = Math.min(sums.length - 1, Math.floor(toM / columnM));
  for (let column = Math.floor(fromM / columnM); column <= last; column += 1) {
    const overlap = Math.min(toM, (column + 1) * columnM) - Math.max(fromM, column * columnM);
    if (overlap <= 0) continue;
    sums[column]! += value * overlap;
    weights[column]! += overlap;
  }
}

/** Where each record's cell ends along its pass; the first reaches back as far as the next reaches on. */
function cellEnds(placed: PlacedLog, pass: Pass): Float64Array {
  const ends = new Float64Array(pass.records);
  let distance = 0;
  for (let step = 0; step < pass.records; step += 1) {
    const from = pass.first + Math.max(0, step - 1);
    const to = step === 0 ? Math.min(pass.first + 1, pass.first + pass.records - 1) : pass.first + step;
    const stepM = Math.hypot(
      placed.originEastM[to]! - placed.originEastM[from]!,
      placed.originNorthM[to]! - placed.originNorthM[from]!,
    );
    distance += Number.isFinite(stepM) ? stepM : 0;
    ends[step] = distance;
  }
  return ends;
}
