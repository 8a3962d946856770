import type { IngestError } from "@/lib/ingest/ingest-error";
import type { Inspection } from "@/lib/ingest/log-format";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { Seeder } from "@/lib/machines/machine";
import type { Result } from "@/lib/result";
import type { Boundary } from "@/lib/schemas/geometry";
import type { PackedPlacedLog } from "@/lib/logs/packed-placed-log";
import type { BuiltAnswers } from "@/lib/server/logs/built-answers";
import type { LogFile } from "@/lib/server/logs/log-file";
import type { LogErrorPlace } from "@/lib/server/logs/log-failure";

/** What the worker asks of a reading thread. */
export type ThreadTask =
  | { task: "inspect"; files: LogFile[]; near: { longitude: number; latitude: number } | null }
  | {
      task: "read";
      /** One, or the parts of one log. */
      files: LogFile[];
      mapping: LogMapping;
      machine: Seeder | null;
      /** Of a named machine that is no seeder. */
      workingWidthM: number | null;
      boundary: Boundary | null;
    };

/** What the thread says: progress any number of times, the placed log once it stands, then one of the others. */
export type ThreadMessage =
  | { kind: "progress"; stage: string; progress: number }
  | { kind: "placed"; placed: PackedPlacedLog }
  | { kind: "inspected"; outcome: Result<Inspection, IngestError> }
  | { kind: "built"; outcome: Result<BuiltAnswers, LogErrorPlace> }
  | { kind: "broken"; message: string };
