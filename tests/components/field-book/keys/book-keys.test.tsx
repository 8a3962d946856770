import { act, fireEvent, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { beforeEach, describe, expect, it } from "vitest";
import { BookKeys } from "@/components/field-book/keys/book-keys";
import { KEY_LIST } from "@/components/field-book/keys/key-list";
import { ShowOnMap } from "@/components/field-book/keys/show-on-map";
import { logVersionKey, trackQuery } from "@/components/field-book/use-log-data";
import { createPassTrack } from "@/lib/map-state/pass-track";
import type { PassBody, PassReadings } from "@/lib/schemas/logs";
import { LOG, renderInBook } from "@/tests/components/field-book/render-in-book";

const VERSION = { logId: LOG.id, version: LOG.version, cleaned: true };

/** A pass due north along one meridian, 50 records a metre apart. */
const READINGS: PassReadings = {
  channel: "margin",
  unit: "N",
  rows: 2,
  records: 50,
  timesS: Array.from({ length: 50 }, (_, i) => i),
  distancesM: Array.from({ length: 50 }, (_, i) => i),
  positions: Array.from({ length: 50 }, (_, i) => [-98.61, 38.41 + i * 9e-6]),
  values: [Array.from({ length: 50 }, () => 400), Array.from({ length: 50 }, () => 500)],
  pass: 2,
  headingsDeg: Array.from({ length: 50 }, () => 0),
  rowOffsetsM: [-0.4, 0.4],
  rowForwardM: [0, 0],
  rowWidthsM: [0.8, 0.8],
};

async function open() {
  const book = renderInBook(
    <>
      <BookKeys />
      <ShowOnMap />
      <input aria-label="Note" />
    </>,
    { state: { channel: "margin", pass: 2 } },
  );
  await act(async () => {
    book.client.setQueryData(logVersionKey(VERSION, "passes"), [1, 2, 5].map((pass) => ({ pass })) as PassBody[]);
    book.client.setQueryData(trackQuery(VERSION, "margin", 2).queryKey, createPassTrack(READINGS));
    // Who listens to answers is told of them a turn later.
    await new Promise((resolve) => setTimeout(resolve));
  });
  return book;
}

const press = (key: string, target: Element = document.body) => fireEvent.keyDown(target, { key });

/** The list is fetched when asked for, which takes as long as the machine is busy. */
const LAZY = { timeout: 20_000 };

beforeEach(() => window.localStorage.clear());

describe("keys anywhere on the page", () => {
  it("step through the passes without moving the map", async () => {
    const { store } = await open();
    press("]");
    expect(store.getState().pass).toBe(5);
    press("[");
    press("[");
    expect(store.getState().pass).toBe(1);
    expect(store.getState().frame).toBeNull();
  });

  it("have the map follow on demand: to the pass, or to the stretch that is brushed", async () => {
    const { store } = await open();
    press("m");
    const [, south, , north] = store.getState().frame!.bounds;
    act(() => store.getState().brush({ pass: 2, fromM: 10, toM: 20 }));
    await userEvent.click(screen.getByRole("button", { name: "Show on the map" }));
    const [, from, , to] = store.getState().frame!.bounds;
    expect(from).toBeGreaterThan(south);
    expect(to).toBeLessThan(north);
    expect(to).toBeGreaterThan(from);
  });

  it("let the stretch go", async () => {
    const { store } = await open();
    act(() => store.getState().brush({ pass: 2, fromM: 10, toM: 20 }));
    press("Escape");
    expect(store.getState().stretch).toBeNull();
  });

  it("are letters where somebody types, and leave the browser's own keys alone", async () => {
    const { store } = await open();
    press("]", screen.getByLabelText("Note"));
    fireEvent.keyDown(document.body, { key: "]", ctrlKey: true });
    expect(store.getState().pass).toBe(2);
  });

  it("show the list of all keys, and can be turned off there", async () => {
    const { store } = await open();
    press("?");
    const dialog = await screen.findByRole("dialog", { name: "Keys" }, LAZY);
    for (const { place } of KEY_LIST) expect(within(dialog).getByRole("region", { name: place })).toBeInTheDocument();
    await userEvent.click(within(dialog).getByRole("checkbox"));
    await userEvent.click(within(dialog).getByRole("button", { name: "Close" }));
    press("]");
    press("?");
    expect(store.getState().pass).toBe(2);
    expect(screen.queryByRole("dialog")).toBeNull();
    // Who turned them off still finds the list by its button.
    await userEvent.click(screen.getByRole("button", { name: "Keys" }));
    expect(await screen.findByRole("dialog", { name: "Keys" }, LAZY)).toBeInTheDocument();
  });
});
