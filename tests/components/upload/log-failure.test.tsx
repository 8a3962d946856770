import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import { useLogActions } from "@/components/hooks/use-logs";
import { LogFailure } from "@/components/upload/log-failure";
import { UnreadLog } from "@/components/upload/unread-log";
import type { Log } from "@/lib/schemas/logs";
import { makeFound } from "@/tests/components/columns/make-columns";
import { makeLogReply } from "@/tests/components/upload/make-log-reply";

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function Shown({ log }: { log: Log }) {
  return <LogFailure log={log} fieldPath="/larkspur/fields/fld_1" role="operator" actions={useLogActions("fld_1")} />;
}

function show(code: string, hasColumns: boolean) {
  const refused = { type: "about:blank", title: "No", status: 409, detail: "Not known.", code: "columns_not_known" };
  vi.stubGlobal("fetch", async () =>
    hasColumns ? Response.json(makeFound()) : Response.json(refused, { status: 409 }),
  );
  const log = makeLogReply({ status: "failed", version: 0, error: { code, message: "It has no columns." } });
  render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <Shown log={log} />
    </QueryClientProvider>,
  );
}

describe("the way out of a log that could not be read", () => {
  it("is another file where nothing could be found in this one", async () => {
    show("not-a-log", false);
    expect(await screen.findByRole("link", { name: "Choose another file" })).toHaveAttribute(
      "href",
      "/larkspur/fields/fld_1/logs",
    );
    expect(screen.queryByRole("link", { name: "Look at the columns" })).toBeNull();
    expect(screen.queryByRole("button", { name: "Read it again" })).toBeNull();
  });

  it("is its columns where they were found", async () => {
    show("rows-differ", true);
    expect(await screen.findByRole("link", { name: "Look at the columns" })).toBeInTheDocument();
  });

  it("is another reading where the last was broken off", async () => {
    show("interrupted", false);
    expect(await screen.findByRole("button", { name: "Read it again" })).toBeInTheDocument();
    expect(screen.queryByRole("link", { name: "Choose another file" })).toBeNull();
  });
});

describe("the rows of a log that is not read", () => {
  it("are not another log's: it is said, with the way to it", () => {
    render(
      <UnreadLog log={makeLogReply({ id: "log_1", status: "needs-mapping" })} logsHref="/larkspur/fields/f/logs" />,
    );
    expect(screen.getByText("This log is not read yet")).toBeInTheDocument();
    expect(screen.getByRole("link", { name: "See how it stands" })).toHaveAttribute(
      "href",
      "/larkspur/fields/f/logs/log_1",
    );
  });
});
