import { screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { ZonesPanel } from "@/components/zones/zones-panel";
import { buildLog } from "@/lib/build/build-log";
import { buildLimitZones } from "@/lib/zones/limit-zones";
import { renderInBook } from "@/tests/components/field-book/render-in-book";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

afterEach(() => vi.unstubAllGlobals());

/** Rows 2 and 3 under target for 40 m, row 4 for 10 m. */
function zones() {
  const low = (record: number, row: number) =>
    ((row === 2 || row === 3) && record >= 40 && record < 120) || (row === 4 && record >= 150 && record < 170);
  const records = straightTrack({ from: [0, 0], headingDeg: 30, records: 200 });
  const log = makeLog({
    records,
    channels: [{ id: "margin", value: (record, row) => (low(record, row) ? 300 : 500) }],
  });
  const built = buildLog(log, makeSeeder({ targetMarginN: 450, marginDeadbandN: 100 }));
  if (!built.ok) throw new Error(built.error.message);
  return buildLimitZones(built.value.placed, { kind: "under-target" });
}

function serve() {
  const asked: string[] = [];
  vi.stubGlobal("fetch", async (path: string) => {
    asked.push(path);
    if (path.includes("kind=under-target")) return Response.json(zones());
    const detail = "At the limit needs the machine's highest force.";
    return Response.json(
      { type: "urn:coulterbook:problem:x", title: "No", status: 422, detail, code: "x" },
      { status: 422 },
    );
  });
  return asked;
}

describe("the zones of a log", () => {
  it("are summed up and listed by patch, in the person's units", async () => {
    serve();
    renderInBook(<ZonesPanel />, { system: "imperial" });
    expect(await screen.findByText(/in 2 patches: 22\.5.% of the worked ground/u)).toBeVisible();
    // 350 N / 4.448222 = 78.7 lbf (NIST SP 811).
    expect(screen.getByText(/Counted: margin below 79.lbf\./u)).toBeVisible();
    const patch = screen.getByRole("button", { name: "See rows 2 to 3 of pass 1" }).closest("tr")!;
    // 40 m / 0.3048 = 131 ft.
    expect(within(patch).getByText("131")).toBeVisible();
  });

  it("are seen on map and pass at a click", async () => {
    serve();
    const { store } = renderInBook(<ZonesPanel />);
    await userEvent.click(await screen.findByRole("button", { name: "See row 4 of pass 1" }));
    const { pass, row, stretch, frame } = store.getState();
    expect({ pass, row }).toEqual({ pass: 1, row: 4 });
    expect(stretch!.fromM).toBeCloseTo(75, 0);
    expect(stretch!.toM - stretch!.fromM).toBeCloseTo(10, 0);
    expect(frame!.bounds[0]).toBeLessThan(frame!.bounds[2]);
  });

  it("go onto the map by a switch that an address keeps", async () => {
    serve();
    const { store } = renderInBook(<ZonesPanel />);
    await userEvent.click(await screen.findByRole("checkbox", { name: /^Show on the map/ }));
    expect(store.getState().ground).toEqual(["under-target"]);
  });

  it("say why there are none of another kind", async () => {
    const asked = serve();
    renderInBook(<ZonesPanel />);
    await userEvent.selectOptions(screen.getByRole("combobox"), "at the limit");
    expect(await screen.findByText(/needs the machine's highest force/)).toBeVisible();
    expect(asked.at(-1)).toBe("/api/v1/logs/log_east/zones?kind=at-limit");
  });

  it("teach what is missing where a log has none of the readings", () => {
    renderInBook(<ZonesPanel />, { log: { channels: [{ id: "speed", unit: "m/s", min: 1, max: 3, perRow: false }] } });
    expect(screen.getByText(/this log has none of them/)).toBeVisible();
  });
});
