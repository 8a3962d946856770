import type { LogNote } from "@/lib/logs/machine-log";
import type { Log } from "@/lib/schemas/logs";

/** What is told about one version of a log, worked out in the reading thread after the log was placed. */
export interface BuiltAnswers {
  notes: LogNote[];
  summary: Pick<Log, "kind" | "counts" | "channels" | "bbox"> & {
    startedAt: Date | null;
    endedAt: Date | null;
  };
  results: { kind: string; body: unknown }[];
}
