import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { beforeAll, describe, expect, it, vi } from "vitest";
import { ChannelSwitch } from "@/components/field-book/channel-switch";
import { Legend } from "@/components/field-book/legend";
import { useClasses } from "@/components/field-book/use-classes";
import { categoriesOf } from "@/lib/legend/categories";
import { histogramOf } from "@/lib/legend/class-edges";
import type { LegendList } from "@/lib/schemas/legends";
import type { LogOverview } from "@/lib/schemas/logs";
import { giveElementsSize, renderInBook } from "@/tests/components/field-book/render-in-book";

const VALUES = Float32Array.from({ length: 1000 }, (_, i) => i);
const MARGIN: LogOverview = {
  channel: "margin",
  unit: "N",
  rows: 8,
  columns: 1,
  passes: [{ pass: 1, from: 0, to: 1 }],
  values: [],
  histogram: { ...histogramOf(VALUES, 0, 1000, 100), distancesM: new Array<number>(100).fill(20) },
  distribution: { offset: 0, step: 1, codes: Array.from(VALUES), distancesM: Array.from(VALUES, () => 2) },
  targetMarginN: 450,
  marginDeadbandN: 100,
  maxDownforceN: 1600,
};
const BY_FORCE: LogOverview = {
  ...MARGIN,
  channel: "marginByForce",
  unit: "1",
  distribution: { offset: 1, step: 1, codes: [0, 3, 5], distancesM: [10, 85, 5] },
};

/** A server that knows legends, and answers every overview with the margin's. */
function serve(legends: LegendList): { puts: unknown[] } {
  const puts: unknown[] = [];
  let now = legends;
  const fetched = vi.fn(async (address: string, init?: RequestInit) => {
    if (address.includes("/overview")) return Response.json(MARGIN);
    if (init?.method === "PUT") {
      const body = JSON.parse(String(init.body)) as { channel: string; unit: string; edges: number[] | null };
      puts.push(body);
      const { edges, ...rest } = body;
      const kept = { ...rest, savedBy: { name: "Ana Ruiz" }, savedAt: "2026-11-30T12:00:00Z" };
      now = { ...now, items: edges ? [{ ...kept, edges }] : [] };
    }
    return Response.json(now);
  });
  vi.stubGlobal("fetch", fetched);
  return { puts };
}

const NONE: LegendList = { items: [], nextCursor: null, changeable: true };
const OURS: LegendList = {
  items: [
    { channel: "margin", unit: "N", edges: [200, 400], savedBy: { name: "Ana Ruiz" }, savedAt: "2026-11-30T12:00:00Z" },
  ],
  nextCursor: null,
  changeable: false,
};

function MarginLegend() {
  return <Legend classes={useClasses("margin", MARGIN)} unit="N" />;
}

beforeAll(() => giveElementsSize(1000, 70));

const edges = () => screen.getAllByRole("textbox").map((field) => (field as HTMLInputElement).value);
const openMenu = () => userEvent.click(screen.getByRole("button", { name: /^Classes/ }));

describe("class edges", () => {
  it("say which way of making them is in use", async () => {
    serve(NONE);
    renderInBook(<MarginLegend />);
    expect(screen.getByRole("button", { name: "Classes: Around the target" })).toBeInTheDocument();
    await openMenu();
    await userEvent.click(await screen.findByRole("menuitem", { name: "Natural breaks" }));
    expect(screen.getByRole("button", { name: "Classes: Natural breaks" })).toBeInTheDocument();
    // Even values 0 .. 999 in six classes: natural breaks cut them into sixths (hand-worked), to a group of three values.
    edges().forEach((edge, i) => expect(Math.abs(Number(edge) - ((i + 1) * 1000) / 6)).toBeLessThan(6));
  });

  it("can be written as numbers of the person's unit", async () => {
    serve(NONE);
    const { store } = renderInBook(<MarginLegend />, { system: "imperial" });
    await openMenu();
    await userEvent.click(await screen.findByRole("menuitem", { name: "Own numbers…" }));
    const field = await screen.findByRole("textbox", { name: "Class edges, lbf" });
    await userEvent.clear(field);
    await userEvent.type(field, "100 50{Enter}");
    expect(screen.getByText(/each larger than the one before/)).toBeInTheDocument();
    await userEvent.clear(field);
    await userEvent.type(field, "50; 100{Enter}");
    // NIST SP 811: 1 lbf = 4.4482216152605 N.
    expect(store.getState().edges.margin!.map((edge) => Number(edge.toFixed(3)))).toEqual([222.411, 444.822]);
    expect(screen.getByRole("button", { name: "Classes: Own numbers" })).toBeInTheDocument();
  });

  it("of the organisation are used by everyone who sets none of their own", async () => {
    serve(OURS);
    const { store } = renderInBook(<MarginLegend />);
    await screen.findByRole("button", { name: "Classes: Ours" });
    expect(edges()).toEqual(["200", "400"]);
    await openMenu();
    expect(screen.queryByRole("menuitem", { name: /Save for everyone/ })).not.toBeInTheDocument();
    expect(screen.getByText(/saved by Ana Ruiz on 30 November 2026/)).toBeInTheDocument();
    await userEvent.click(await screen.findByRole("menuitem", { name: "Around the target" }));
    expect(store.getState().edges.margin).toEqual([250, 350, 400, 500, 550, 650]);
    await openMenu();
    await userEvent.click(await screen.findByRole("menuitem", { name: "Use ours" }));
    expect(edges()).toEqual(["200", "400"]);
  });

  it("are saved for everyone by those who may, and given up again", async () => {
    const { puts } = serve(NONE);
    const { store } = renderInBook(<MarginLegend />, { state: { edges: { margin: [111, 222] } } });
    await waitFor(async () => {
      await openMenu();
      expect(screen.getByRole("menuitem", { name: "Save for everyone here" })).toBeInTheDocument();
    });
    await userEvent.click(screen.getByRole("menuitem", { name: "Save for everyone here" }));
    await screen.findByText("Saved for everyone here.");
    expect(puts).toEqual([{ channel: "margin", unit: "N", edges: [111, 222] }]);
    await screen.findByRole("button", { name: "Classes: Ours" });
    expect(store.getState().edges.margin).toBeUndefined();
    await openMenu();
    await userEvent.click(await screen.findByRole("menuitem", { name: "Give ours up" }));
    await screen.findByText("Given up for everyone here.");
    expect(screen.getByRole("button", { name: "Classes: Around the target" })).toBeInTheDocument();
  });
});

describe("names instead of amounts", () => {
  function ByForceLegend() {
    return <Legend classes={useClasses("marginByForce", BY_FORCE)} unit="1" />;
  }

  it("stand in the legend with colour, pattern, letter and share of distance, and no edges to move", () => {
    serve(NONE);
    renderInBook(<ByForceLegend />, { state: { channel: "marginByForce" } });
    const list = screen.getByRole("list", { name: "Classes by share of distance" });
    const items = within(list)
      .getAllByRole("listitem")
      .map((item) => item.textContent);
    expect(items[0]).toContain("Short of weight, or resistance too high 10\u202f% of distance");
    expect(items[3]).toContain("In band 85\u202f% of distance");
    expect(items[4]).toContain("Target too high 0\u202f%");
    expect(screen.queryByRole("slider")).not.toBeInTheDocument();
    const names = categoriesOf("marginByForce")!;
    expect(new Set(names.map(({ letter }) => letter)).size).toBe(names.length);
    expect(new Set(names.map(({ pattern }) => pattern)).size).toBe(names.length);
    expect(new Set(names.map(({ colour }) => colour)).size).toBe(names.length);
  });

  it("are offered by what the log and its machine give, apart from what was logged", async () => {
    serve(NONE);
    const { store } = renderInBook(<ChannelSwitch />, { log: { machineId: "mac_drill" } });
    await waitFor(async () => {
      await userEvent.click(screen.getByRole("button", { name: "More" }));
      expect(screen.getByRole("menuitem", { name: "Margin by force" })).toBeInTheDocument();
    });
    const group = screen.getByRole("group", { name: "Worked out" });
    expect(within(group).getByRole("menuitem", { name: "Under target" })).toBeInTheDocument();
    expect(within(screen.getByRole("group", { name: "Against the other rows" })).getAllByRole("menuitem").length).toBe(
      4,
    );
    await userEvent.click(screen.getByRole("menuitem", { name: "Margin by force" }));
    expect(store.getState().channel).toBe("marginByForce");
  });
});
