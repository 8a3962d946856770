import type { ColumnProposal } from "@/lib/ingest/log-format";
import { isMissing, parseNumber } from "@/lib/ingest/records/parse-number";
import type { ChannelId } from "@/lib/logs/channel";
import { unitFactor } from "@/lib/units/convert-unit";
import { getUnit } from "@/lib/units/unit-table";

/** One column of the sample that is proposed as a measured channel. */
export interface SampledReadings {
  channel: ChannelId;
  row: number | undefined;
  proposal: ColumnProposal;
  /** In SI where the unit is known, else as written; NaN where there is none. One entry a sampled record. */
  values: Float64Array;
  isSi: boolean;
}

export interface SampleSource {
  cells(field: number): string[];
  decimalComma: boolean;
}

/** Numbers of a sampled column; what stands for "nothing here" is NaN. */
export function sampledNumbers(
  field: number,
  missing: readonly number[],
  { cells, decimalComma }: SampleSource,
): Float64Array {
  return Float64Array.from(cells(field), (cell) => {
    const value = isMissing(cell) ? NaN : parseNumber(cell, decimalComma);
    return missing.includes(value) ? NaN : value;
  });
}

/** Columns proposed for one of these channels, with their sampled readings. */
export function sampledReadings(
  proposals: readonly (ColumnProposal | null)[],
  channels: readonly ChannelId[],
  source: SampleSource,
): SampledReadings[] {
  return proposals.flatMap((proposal, field) => {
    if (!proposal || !channels.includes(proposal.channel)) return [];
    const { channel, row, unit, missing = [] } = proposal;
    const values = sampledNumbers(field, missing, source);
    const isSi = unit !== null && unit !== "bu/ac" && getUnit(unit).quantity !== "clock";
    if (isSi) {
      const factor = unitFactor(unit);
      for (let i = 0; i < values.length; i++) values[i] = (values[i] ?? NaN) * factor;
    }
    return [{ channel, row, proposal, values, isSi }];
  });
}

/** Middle of the numbers there are; NaN of none. */
export function medianOf(values: Iterable<number>): number {
  const sorted = [...values].filter((value) => !Number.isNaN(value)).sort((a, b) => a - b);
  return sorted[sorted.length >> 1] ?? NaN;
}
