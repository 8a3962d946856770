import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { useLogActions } from "@/components/hooks/use-logs";
import { LogMenu } from "@/components/upload/log-menu";
import type { Log } from "@/lib/schemas/logs";
import { makeLogReply } from "@/tests/components/upload/make-log-reply";

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function Menu({ log }: { log: Log }) {
  const actions = useLogActions(log.fieldId);
  return <LogMenu log={log} fieldPath="/larkspur/fields/fld_1" role="operator" actions={actions} />;
}

async function open(log: Log) {
  render(
    <QueryClientProvider client={new QueryClient()}>
      <Menu log={log} />
    </QueryClientProvider>,
  );
  await userEvent.click(screen.getByRole("button", { name: `More for ${log.name}` }));
}

describe("an operator's menu of a log", () => {
  it("removes an upload that the server says may go", async () => {
    const fetched = vi.fn(async (_path: string, _init?: RequestInit) => new Response(null, { status: 204 }));
    vi.stubGlobal("fetch", fetched);
    const log = makeLogReply({ status: "failed", removable: true });
    await open(log);
    await userEvent.click(await screen.findByRole("menuitem", { name: "Remove…" }));
    await userEvent.click(await screen.findByRole("button", { name: "Remove the log" }));
    expect(fetched.mock.calls[0]?.[0]).toBe(`/api/v1/logs/${log.id}`);
    expect(fetched.mock.calls[0]?.[1]?.method).toBe("DELETE");
  });

  it("offers nothing of the kind for a log that is to stay", async () => {
    await open(makeLogReply({ removable: false }));
    await screen.findByRole("menuitem", { name: "How it was read" });
    expect(screen.queryByRole("menuitem", { name: /remove/i })).toBeNull();
  });
});
