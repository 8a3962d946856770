import type { RowStatisticsBody } from "@/lib/schemas/logs";
import { finiteOrNull } from "@/lib/statistics/finite-or-null";
import type { RowStatistics } from "@/lib/statistics/row-statistics";

/** The line-up as the API tells it. */
export function rowStatisticsBody(known: RowStatistics): RowStatisticsBody {
  const { channel, unit, items, deviations, wheelTrackRows, medianOfRows } = known;
  return {
    channel,
    unit,
    items: items.map((item, row) => ({ ...item, deviation: finiteOrNull(deviations[row]!) })),
    wheelTrackRows,
    medianOfRows: finiteOrNull(medianOfRows),
  };
}
