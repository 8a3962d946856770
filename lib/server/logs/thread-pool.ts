import type { Environment } from "@/lib/server/env";
import { LogThread } from "@/lib/server/logs/log-thread";

/** Reading threads, warm ones first: starting one costs about as much as reading a small log. */
export class ThreadPool {
  private idle: LogThread[] = [];

  constructor(private readonly env: Environment) {}

  /** Starts threads ahead of the first log. */
  warm(count: number): void {
    while (this.idle.length < count) this.idle.push(new LogThread(this.env));
  }

  async use<T>(work: (thread: LogThread) => Promise<T>): Promise<T> {
    const thread = this.idle.pop() ?? new LogThread(this.env);
    const used = thread.usable ? thread : new LogThread(this.env);
    try {
      return await work(used);
    } finally {
      if (used.usable) this.idle.push(used);
      else this.warm(1);
    }
  }

  async close(): Promise<void> {
    await Promise.all(this.idle.splice(0).map((thread) => thread.kill()));
  }
}
