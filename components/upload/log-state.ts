import type { MarkState } from "@/components/ui/state-mark";
import type { LogStatus } from "@/lib/schemas/logs";

/** Whether the server is busy with a log, so that it may change by itself. */
export function isWorking(status: LogStatus): boolean {
  return status === "queued" || status === "reading" || status === "building";
}

interface StateWords {
  mark: MarkState;
  word: string;
}

const STATES: Record<LogStatus, StateWords> = {
  queued: { mark: "none", word: "Waiting its turn" },
  reading: { mark: "none", word: "Being read" },
  "needs-mapping": { mark: "look", word: "Say what the columns mean" },
  building: { mark: "none", word: "Being worked out" },
  ready: { mark: "fine", word: "Ready" },
  failed: { mark: "act", word: "Could not be read" },
};

/** A log's status as a word and a shape. */
export function describeLogStatus(status: LogStatus): StateWords {
  return STATES[status];
}

/** Kinds of file a log may come in, for the file picker. */
export const LOG_FILE_KINDS = ".csv,.tsv,.txt,.gz,.geojson,.json,.zip";
