import { act, fireEvent, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { beforeAll, describe, expect, it } from "vitest";
import { Legend } from "@/components/field-book/legend";
import { useClasses } from "@/components/field-book/use-classes";
import { histogramOf } from "@/lib/legend/class-edges";
import { classColours } from "@/lib/legend/ramps";
import type { LogOverview } from "@/lib/schemas/logs";
import { giveElementsSize, renderInBook } from "./render-in-book";

const VALUES = Float32Array.from({ length: 1000 }, (_, i) => i);
const OVERVIEW: LogOverview = {
  channel: "margin",
  unit: "N",
  rows: 8,
  columns: 1,
  passes: [{ pass: 1, from: 0, to: 1 }],
  values: [],
  histogram: histogramOf(VALUES, 0, 1000, 100),
  distribution: { offset: 0, step: 1, codes: Array.from(VALUES), distancesM: Array.from(VALUES, () => 2) },
  targetMarginN: 450,
  marginDeadbandN: 100,
  maxDownforceN: 1600,
};

function LegendOfMargin() {
  return <Legend classes={useClasses("margin", OVERVIEW)} unit="N" />;
}

beforeAll(() => giveElementsSize(1000, 70));

const edges = () => screen.getAllByRole("textbox").map((field) => (field as HTMLInputElement).value);

describe("the legend", () => {
  it("writes the class edges as numbers, about the target by default, its pale colour in the middle", () => {
    renderInBook(<LegendOfMargin />);
    expect(edges()).toEqual(["250", "350", "400", "500", "550", "650"]);
    const colours = screen.getAllByTestId("class-swatch").map((swatch) => swatch.dataset.colour);
    expect(colours).toEqual(classColours("PuOr", 7, 3));
  });

  it("writes round edges in pounds-force, and the exact one where under target begins", () => {
    renderInBook(<LegendOfMargin />, { system: "imperial" });
    // 450 and 100 N are 101.16 and 22.48 lbf (NIST SP 811): one tolerance off are 78.7 and 123.6.
    expect(edges()).toEqual(["56", "78.7", "90", "112", "123.6", "146"]);
  });

  it("says how much of the distance lies in each class", () => {
    renderInBook(<LegendOfMargin />);
    // Even values 0 .. 999: a quarter below 250, a tenth in 250 .. 350, and so on (hand-worked).
    expect(screen.getByText("25 %")).toBeInTheDocument();
    expect(screen.getByText("35 %")).toBeInTheDocument();
    expect(screen.getByText("share of distance")).toBeInTheDocument();
  });

  it("takes a typed edge in the person's unit", async () => {
    const { store } = renderInBook(<LegendOfMargin />, { system: "imperial" });
    const field = screen.getByRole("textbox", { name: "Class edge 1, lbf" });
    await userEvent.clear(field);
    await userEvent.type(field, "40{Enter}");
    // 40 lbf = 177.93 N (NIST SP 811).
    expect(store.getState().edges.margin?.[0]).toBeCloseTo(177.93, 2);
  });

  it("says why a typed edge cannot be", async () => {
    renderInBook(<LegendOfMargin />);
    const field = screen.getByRole("textbox", { name: "Class edge 2, N" });
    await userEvent.clear(field);
    await userEvent.type(field, "abc{Enter}");
    expect(screen.getByRole("alert")).toHaveTextContent("“abc” is no number");
    await userEvent.clear(field);
    await userEvent.type(field, "900{Enter}");
    expect(screen.getByRole("alert")).toHaveTextContent(/above 250.N and below 400.N/);
    await userEvent.clear(field);
    await userEvent.type(field, "355{Enter}");
    expect(screen.queryByRole("alert")).not.toBeInTheDocument();
  });

  it("refuses an edge out of order and shows the one in force", async () => {
    const { store } = renderInBook(<LegendOfMargin />);
    const field = screen.getByRole("textbox", { name: "Class edge 1, N" });
    await userEvent.clear(field);
    await userEvent.type(field, "900{Enter}");
    expect(store.getState().edges.margin).toBeUndefined();
    expect(edges()[0]).toBe("250");
  });

  it("moves an edge by keys, never past its neighbour", async () => {
    const { store } = renderInBook(<LegendOfMargin />);
    const handle = screen.getByRole("slider", { name: "Class edge 3" });
    act(() => handle.focus());
    await userEvent.keyboard("{ArrowRight}");
    expect(store.getState().edges.margin?.[2]).toBeCloseTo(405, 6);
    for (let i = 0; i < 5; i += 1) fireEvent.keyDown(handle, { key: "ArrowRight", shiftKey: true });
    const moved = store.getState().edges.margin!;
    expect(moved[2]).toBeLessThan(moved[3]!);
    expect(moved[2]).toBeGreaterThan(490);
  });

  it("goes to the published contact loads and back", async () => {
    const { store } = renderInBook(<LegendOfMargin />);
    await userEvent.click(screen.getByRole("button", { name: /Classes/ }));
    await userEvent.click(await screen.findByRole("menuitem", { name: "Published contact loads" }));
    expect(store.getState().edges.margin).toEqual([180, 490, 890]);
    expect(edges()).toEqual(["180", "490", "890"]);
    await userEvent.click(screen.getByRole("button", { name: /Classes/ }));
    await userEvent.click(await screen.findByRole("menuitem", { name: "Around the target" }));
    expect(store.getState().edges.margin).toBeUndefined();
  });
});
