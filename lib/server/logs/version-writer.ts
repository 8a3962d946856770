import type { LogRow } from "@/db/queries/logs";
import { writeLogVersion, type VersionAnswers } from "@/db/queries/system/log-versions";
import type { PackedPlacedLog } from "@/lib/logs/packed-placed-log";
import type { Seeder } from "@/lib/machines/machine";
import type { BuiltAnswers } from "@/lib/server/logs/built-answers";
import { LogInterrupted } from "@/lib/server/logs/log-failure";
import type { LogProgress } from "@/lib/server/logs/log-progress";
import { toPlacedBody } from "@/lib/server/logs/placed-body";

/** Writes a version from the moment the log is placed, while what is told about it is still being worked out. */
export class VersionWriter {
  private writing: Promise<boolean> | undefined;
  private placed: PackedPlacedLog | undefined;
  private tellAnswers: (answers: VersionAnswers) => void = () => undefined;
  private refuseAnswers: (error: unknown) => void = () => undefined;

  constructor(
    private readonly log: LogRow,
    private readonly machine: Seeder | null,
    private readonly progress: LogProgress,
  ) {}

  begin(placed: PackedPlacedLog): void {
    this.placed = placed;
    const answers = new Promise<VersionAnswers>((resolve, reject) => {
      this.tellAnswers = resolve;
      this.refuseAnswers = reject;
    });
    const { log, progress } = this;
    this.writing = writeLogVersion({
      organisationId: log.organisationId,
      logId: log.id,
      version: log.version + 1,
      placed,
      answers,
      onProgress: () => progress.signal.throwIfAborted(),
      beforeSwitch: () => progress.end(),
    });
    // Looked at in `finish` and `undo`; until then a refusal is no unhandled one.
    this.writing.catch(() => undefined);
    answers.catch(() => undefined);
  }

  /** Makes the version the one that readers see. @throws LogInterrupted when the log was stopped or deleted meanwhile */
  async finish(answers: BuiltAnswers): Promise<void> {
    if (!this.placed || !this.writing) throw new Error("answers came before the log was placed");
    this.progress.tell("Storing the readings", 0.9, "building");
    this.tellAnswers({
      results: [...answers.results, { kind: "placed", body: toPlacedBody(this.placed) }],
      change: {
        ...answers.summary,
        notes: answers.notes,
        machineBody: this.machine,
        status: "ready",
        stage: "Ready",
        progress: 1,
        error: null,
      },
    });
    if (await this.writing) return;
    this.progress.signal.throwIfAborted();
    throw new LogInterrupted("cancelled");
  }

  /** Rolls back what was written; resolves when nothing of it is left. */
  async undo(error: unknown): Promise<void> {
    this.refuseAnswers(error);
    await this.writing?.catch(() => undefined);
  }
}
