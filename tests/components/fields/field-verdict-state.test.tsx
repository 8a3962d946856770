import { cleanup, render, screen } from "@testing-library/react";
import { afterEach, describe, expect, it } from "vitest";
import { FieldVerdictState, sayWaiting } from "@/components/fields/field-verdict-state";
import type { NewestLog } from "@/lib/schemas/fields";

afterEach(cleanup);

const read: NewestLog = {
  id: "log_1",
  name: "east-quarter-seeding",
  kind: "seeding",
  status: "ready",
  isElsewhere: false,
  severity: "ok",
};

function show(newestLog: NewestLog | null, waitingLogs = 0, mayUpload = true) {
  render(<FieldVerdictState field={{ newestLog, waitingLogs }} mayUpload={mayUpload} />);
}

describe("what a field's row says", () => {
  it("is the verdict of the log that speaks for it, with a word on what waits", () => {
    show(read, 2);
    expect(screen.getByText("Fine")).toBeInTheDocument();
    expect(screen.getByText("2 logs wait for you")).toBeInTheDocument();
  });

  it("does not ask somebody who may not take logs in", () => {
    show(read, 1, false);
    expect(screen.queryByText(/waits? for you/)).toBeNull();
  });

  it("is never Fine where the readings lie elsewhere", () => {
    show({ ...read, isElsewhere: true });
    expect(screen.getByText("Look: readings lie elsewhere")).toBeInTheDocument();
    expect(screen.queryByText("Fine")).toBeNull();
  });

  it("is the state of the only upload where none was read yet, and does not claim Fine without a verdict", () => {
    show({ ...read, status: "failed", severity: null }, 1);
    expect(screen.getByText("Could not be read")).toBeInTheDocument();
    expect(screen.queryByText(/waits for you/)).toBeNull();
    cleanup();
    show({ ...read, severity: null });
    expect(screen.getByText("Ready")).toBeInTheDocument();
  });

  it("says that there is no log", () => {
    show(null);
    expect(screen.getByText("No log yet")).toBeInTheDocument();
    expect([sayWaiting(0), sayWaiting(1)]).toEqual([null, "1 log waits for you"]);
  });
});
