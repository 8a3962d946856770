import { withOrganisation } from "@/db/client";
import { findLog, changeLog } from "@/db/queries/logs";
import type { LogStatus } from "@/lib/schemas/logs";
import { LogInterrupted } from "@/lib/server/logs/log-failure";
import { workerScope } from "@/lib/server/logs/worker-scope";

const WRITE_MS = 250;

interface State {
  status: LogStatus;
  stage: string;
  progress: number;
}

/**
 * Writes progress to the log's row at most four times a second, and looks there for a wish to stop: `signal` aborts with
 * `LogInterrupted` when the log was cancelled or deleted, or with the outer signal's reason.
 */
export class LogProgress {
  private readonly controller = new AbortController();
  private readonly timer: NodeJS.Timeout;
  private writing: Promise<void> = Promise.resolve();
  private written = "";
  private state: State;

  constructor(
    private readonly organisationId: string,
    private readonly logId: string,
    first: State,
    private readonly outer: AbortSignal,
  ) {
    this.state = first;
    if (outer.aborted) this.stop();
    else outer.addEventListener("abort", this.stop, { once: true });
    this.timer = setInterval(() => (this.writing = this.writing.then(() => this.write())), WRITE_MS);
  }

  private readonly stop = () => this.controller.abort(this.outer.reason);

  get signal(): AbortSignal {
    return this.controller.signal;
  }

  tell(stage: string, progress: number, status: LogStatus = this.state.status): void {
    // Never backwards: a person takes a shrinking bar for a fault.
    this.state = { status, stage, progress: Math.max(this.state.progress, Math.min(1, progress)) };
  }

  /** Stops the writing; no progress lands after this resolves. */
  async end(): Promise<void> {
    clearInterval(this.timer);
    this.outer.removeEventListener("abort", this.stop);
    await this.writing;
  }

  private async write(): Promise<void> {
    const scope = workerScope(this.organisationId);
    const state = { ...this.state };
    const text = JSON.stringify(state);
    try {
      const row = await withOrganisation(scope, async (tx) => {
        const found = await findLog(tx, scope, this.logId);
        if (found && text !== this.written) await changeLog(tx, scope, this.logId, state);
        return found;
      });
      this.written = text;
      if (!row) this.controller.abort(new LogInterrupted("deleted"));
      else if (row.cancelRequestedAt) this.controller.abort(new LogInterrupted("cancelled"));
    } catch (error) {
      // Progress is a courtesy: a database that is away for a moment must not stop the log.
      console.error(`progress of ${this.logId}: ${error instanceof Error ? error.message : String(error)}`);
    }
  }
}
