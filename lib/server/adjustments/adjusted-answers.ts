import { resolveChannel } from "@/lib/channels/resolve-channel";
import { passVerdict } from "@/lib/findings/pass-verdict";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { rowDistances } from "@/lib/rows/row-distances";
import { describeRows, type RowStatistics } from "@/lib/statistics/row-statistics";
import { rowStatisticsBody } from "@/lib/statistics/row-statistics-body";

/** The answers of a log that its adjustments change: rows of every channel, and the verdict. Passes and coverage stay. */
export function adjustedAnswers(placed: PlacedLog): { kind: string; body: unknown }[] {
  const distances = rowDistances(placed);
  const statistics = new Map<string, RowStatistics>();
  const ids = [...placed.log.channels.map((channel) => channel.id), "resistance"];
  const rows = ids.flatMap((id) => {
    const channel = resolveChannel(placed, id);
    if (!channel) return [];
    const known = describeRows(placed, channel, distances);
    statistics.set(id, known);
    return [{ kind: `rows:${id}`, body: rowStatisticsBody(known) }];
  });
  return [...rows, { kind: "verdict", body: passVerdict(placed, { distances, statistics }) }];
}
