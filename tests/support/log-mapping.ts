import type { LogColumns } from "@/lib/schemas/logs";

/** What a person confirms on the columns screen: every proposal that has a unit; other columns are left out. */
export function confirmedMapping(columns: LogColumns): { shape: string; columns: Record<string, unknown>[] } {
  return {
    shape: columns.shape,
    columns: columns.columns.flatMap(({ name, proposal }) =>
      proposal?.unit
        ? [{ name, channel: proposal.channel, row: proposal.row, unit: proposal.unit, format: proposal.format }]
        : [],
    ),
  };
}
