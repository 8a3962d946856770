import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen } from "@testing-library/react";
import { afterEach, describe, expect, it } from "vitest";
import { FieldVerdictState, sayWaiting, speakingLog } from "@/components/fields/field-verdict-state";
import { queryKeys } from "@/components/hooks/query-keys";
import type { Log } from "@/lib/schemas/logs";
import { makeLogReply } from "@/tests/components/upload/make-log-reply";

afterEach(cleanup);

const FINE = { rowsUnderTarget: [], rowsAtLimit: [], weight: { headroomN: null, shareLiftedM2: null, state: "enough" }, findings: [] }; // prettier-ignore

function show(logs: Log[], mayUpload = true) {
  const client = new QueryClient({ defaultOptions: { queries: { staleTime: Infinity, retry: false } } });
  client.setQueryData([...queryKeys.logs("fld_1"), 50], { items: logs, nextCursor: null });
  for (const log of logs) client.setQueryData(queryKeys.verdict(log.id, log.version), FINE);
  render(
    <QueryClientProvider client={client}>
      <FieldVerdictState fieldId="fld_1" logCount={logs.length} mayUpload={mayUpload} />
    </QueryClientProvider>,
  );
}

const ready = makeLogReply({ id: "log_ready" });
const failed = makeLogReply({ id: "log_failed", status: "failed", version: 0 });
const unread = makeLogReply({ id: "log_unread", status: "needs-mapping", version: 0 });

describe("what a field's row says", () => {
  it("is the verdict of the newest log that was read, with a word on what waits", () => {
    show([unread, failed, ready]);
    expect(screen.getByText("Fine")).toBeInTheDocument();
    expect(screen.getByText("2 logs wait for you")).toBeInTheDocument();
    expect(screen.queryByText("Could not be read")).toBeNull();
  });

  it("does not ask somebody who may not take logs in", () => {
    show([failed, ready], false);
    expect(screen.queryByText(/waits? for you/)).toBeNull();
  });

  it("is never Fine where the readings lie elsewhere", () => {
    const notes = [{ code: "outside-field", count: 9, message: "None of these records lie in Mill bottom." }];
    show([makeLogReply({ notes })]);
    expect(screen.getByText("Look: readings lie elsewhere")).toBeInTheDocument();
    expect(screen.queryByText("Fine")).toBeNull();
  });

  it("is the state of the only upload where none was read yet", () => {
    show([failed]);
    expect(screen.getByText("Could not be read")).toBeInTheDocument();
  });
});

describe("the log that speaks for a field", () => {
  it("is a seeding log before a harvest log", () => {
    expect(speakingLog([unread, makeLogReply({ id: "log_harvest", kind: "harvest" }), ready])).toBe(ready);
    expect(sayWaiting([failed, ready])).toBe("1 log waits for you");
    expect(sayWaiting([ready])).toBeNull();
  });
});
