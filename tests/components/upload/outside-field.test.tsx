import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { queryKeys } from "@/components/hooks/query-keys";
import { OutsideField } from "@/components/upload/outside-field";
import { makeLogReply } from "@/tests/components/upload/make-log-reply";

const push = vi.fn();
vi.mock("next/navigation", () => ({ useRouter: () => ({ push }) }));
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const message = "None of these records lie in Mill bottom: they lie 3.1 km away, in East quarter.";
const log = makeLogReply({
  fieldId: "fld_mill",
  notes: [{ code: "outside-field", count: 12_000, message, fieldId: "fld_east" }],
});

function show(mayMove: boolean) {
  const client = new QueryClient({ defaultOptions: { queries: { staleTime: Infinity, retry: false } } });
  const items = [
    { id: "fld_east", name: "East quarter" },
    { id: "fld_mill", name: "Mill bottom" },
  ];
  client.setQueryData(queryKeys.fields, { items, nextCursor: null });
  render(
    <QueryClientProvider client={client}>
      <OutsideField log={log} fieldPath="/larkspur/fields/fld_mill" mayMove={mayMove} />
    </QueryClientProvider>,
  );
}

describe("a log that lies in another field", () => {
  it("says where, and is moved with one press", async () => {
    const fetched = vi.fn(async (_path: string, _init?: RequestInit) =>
      Response.json({ ...log, fieldId: "fld_east", status: "queued" }),
    );
    vi.stubGlobal("fetch", fetched);
    show(true);
    expect(screen.getByRole("alert")).toHaveTextContent(message);
    await userEvent.click(screen.getByRole("button", { name: "Move it to East quarter" }));
    await waitFor(() => expect(push).toHaveBeenCalledWith(`/larkspur/fields/fld_east/logs/${log.id}`));
    const [path, init] = fetched.mock.calls[0] ?? [];
    expect([path, init?.method, init?.body]).toEqual([
      `/api/v1/logs/${log.id}`,
      "PATCH",
      JSON.stringify({ fieldId: "fld_east" }),
    ]);
  });

  it("is only told to who may not move it", () => {
    show(false);
    expect(screen.getByRole("alert")).toHaveTextContent(message);
    expect(screen.queryByRole("button")).toBeNull();
  });
});
