import type { LoggedDevice } from "@/lib/ingest/log-format";
import type { LogNote } from "@/lib/logs/machine-log";
import { compareDevice } from "@/lib/machines/compare-device";
import type { Machine } from "@/lib/machines/machine";
import { sayDifference, sayMetres } from "@/lib/machines/say-device";

/** A note where the machine that places the rows is another than the one the file describes. */
export function noteDevice(device: LoggedDevice | undefined, machine: Machine | null): LogNote[] {
  const differences = device && machine ? compareDevice(device, machine) : [];
  if (differences.length === 0) return [];
  const said = differences.map((difference) => sayDifference(difference, sayMetres)).join(" ");
  const message = `The machine chosen for this log is not the one the file describes. ${said} Rows were placed by the chosen one.`;
  return [{ code: "device-disagrees", count: differences.length, message }];
}
