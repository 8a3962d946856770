import type { Log } from "@/lib/schemas/logs";

export type LogErrorPlace = NonNullable<Log["error"]>;

/** The log cannot be read, and reading it again would not help. What it says is for the person who uploaded it. */
export class LogFailure extends Error {
  readonly place: LogErrorPlace;

  constructor(place: LogErrorPlace) {
    super(place.message);
    this.name = "LogFailure";
    this.place = place;
  }
}

/** Why work on a log stopped before its end, without a fault of the log. */
export class LogInterrupted extends Error {
  constructor(readonly reason: "cancelled" | "deleted" | "shutdown") {
    super(`the log was stopped: ${reason}`);
    this.name = "LogInterrupted";
  }
}
