import type { ResolvedChannel } from "@/lib/channels/resolved-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { fail, succeed, type Result } from "@/lib/result";

/** When each record was logged, seconds since the log's first time; one value a record, NaN outside passes. */
export function workedTime(placed: PlacedLog): Result<ResolvedChannel, string> {
  const { timeMs, records } = placed.log;
  const began = timeMs.find((time) => Number.isFinite(time));
  if (began === undefined) return fail("This log does not say when its records were made.");
  const values = new Float32Array(records).fill(NaN);
  for (let record = 0; record < records; record += 1) {
    if (placed.passOf[record]! > 0) values[record] = (timeMs[record]! - began) / 1000;
  }
  return succeed({ id: "time", unit: "s", rows: 1, perRow: false, values, resolution: null, censoredShare: null });
}
