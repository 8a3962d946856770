import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { act, cleanup, fireEvent, render, screen } from "@testing-library/react";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { UNDO_MS } from "@/components/removals/removals-store";
import { RemovalsProvider, useRemove, useWithoutRemoved } from "@/components/removals/use-removals";

beforeEach(() => vi.useFakeTimers());
afterEach(() => {
  cleanup();
  vi.useRealTimers();
});

const FIELDS = [
  { id: "fld_1", name: "East quarter" },
  { id: "fld_2", name: "Mill bottom" },
];

function List({ remove }: { remove: (id: string) => Promise<void> }) {
  const begin = useRemove();
  const shown = useWithoutRemoved(FIELDS) ?? [];
  return (
    <ul>
      {shown.map(({ id, name }) => (
        <li key={id}>
          <button type="button" onClick={() => begin({ id, name, remove: () => remove(id), lists: [] })}>
            {name}
          </button>
        </li>
      ))}
    </ul>
  );
}

function show(remove: (id: string) => Promise<void>) {
  render(
    <QueryClientProvider client={new QueryClient()}>
      <RemovalsProvider>
        <List remove={remove} />
      </RemovalsProvider>
    </QueryClientProvider>,
  );
  fireEvent.click(screen.getByRole("button", { name: "East quarter" }));
}

const names = () => screen.getAllByRole("listitem").map(({ textContent }) => textContent);
const pass = (ms: number) => act(() => vi.advanceTimersByTimeAsync(ms));

describe("a removal", () => {
  it("leaves the list at once and the server after half a minute", async () => {
    const remove = vi.fn(async () => undefined);
    show(remove);
    expect(names()).toEqual(["Mill bottom"]);
    expect(screen.getByRole("status").textContent).toContain("East quarter is removed");
    await pass(UNDO_MS - 1);
    expect(remove).not.toHaveBeenCalled();
    await pass(1);
    expect(remove.mock.calls).toEqual([["fld_1"]]);
    expect(screen.queryByRole("button", { name: "Undo" })).toBeNull();
  });

  it("is called off by Undo, which has the focus, and then never sent", async () => {
    const remove = vi.fn(async () => undefined);
    show(remove);
    await pass(1000);
    expect(screen.getByRole("button", { name: "Undo" })).toHaveFocus();
    fireEvent.click(screen.getByRole("button", { name: "Undo" }));
    expect(names()).toEqual(["East quarter", "Mill bottom"]);
    await pass(2 * UNDO_MS);
    expect(remove).not.toHaveBeenCalled();
  });

  it("is sent when the page is left, once", async () => {
    const remove = vi.fn(async () => undefined);
    show(remove);
    fireEvent(window, new Event("pagehide"));
    await pass(2 * UNDO_MS);
    expect(remove.mock.calls).toEqual([["fld_1"]]);
  });

  it("comes back with the reason where the server refuses", async () => {
    show(async () => {
      throw new TypeError("no answer");
    });
    await pass(UNDO_MS);
    expect(names()).toEqual(["East quarter", "Mill bottom"]);
    expect(screen.getByRole("status").textContent).toContain("East quarter is still here.");
  });
});
