"use client";

import { useChannelUnits } from "@/components/field-book/use-channel-units";
import type { RowStatisticsBody } from "@/lib/schemas/logs";
import { rowsInWords } from "@/lib/statistics/group-rows";

/** The share of the median row that a difference must exceed; the API flags by the same. */
const FLAG_SHARE = 0.05;

/** When a row stands out, in words with this log's numbers; and who was compared among themselves. */
export function FlagRule({ statistics }: { statistics: RowStatisticsBody }) {
  const { channel, unit, items, medianOfRows, wheelTrackRows = [] } = statistics;
  const units = useChannelUnits(unit, channel);
  if (!items.some((item) => item.deviationZ !== null)) return null;
  const least = medianOfRows == null ? "" : ` (${units.format(FLAG_SHARE * Math.abs(medianOfRows))})`;
  return (
    <>
      {" "}
      <span aria-hidden className="inline-block size-2 bg-clay" /> Stands out: z beyond 3.5 either way, and more than 5
      {"\u202f"}%{least} from the others.
      {wheelTrackRows.length > 0
        ? ` Rows ${rowsInWords(wheelTrackRows)} run in wheel tracks and are compared among themselves.`
        : ""}
    </>
  );
}
