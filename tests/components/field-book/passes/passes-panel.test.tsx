import { act, configure, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { beforeAll, beforeEach, describe, expect, it, vi } from "vitest";
import { PassesPanel } from "@/components/field-book/passes/passes-panel";
import { PassesTable } from "@/components/field-book/passes/passes-table";
import { rampWords } from "@/components/field-book/passes/ramp-words";
import { SideTabs } from "@/components/field-book/side-tabs";
import { giveElementsSize, renderInBook } from "@/tests/components/field-book/render-in-book";
import { PASSES, RAMPS } from "@/tests/components/field-book/passes/pass-figures";

// A busy machine takes longer than the library waits by itself.
configure({ asyncUtilTimeout: 10_000 });
beforeAll(() => giveElementsSize(380, 260));
beforeEach(() => {
  vi.stubGlobal("fetch", (path: string) =>
    Promise.resolve(new Response(JSON.stringify(path.includes("/ramps") ? RAMPS : PASSES))),
  );
});

const show = async (view: string) =>
  userEvent.selectOptions(await screen.findByLabelText("What to show of the passes"), view);

describe("passes one by one", () => {
  it("are all there, and a click unrolls one", async () => {
    const { store } = renderInBook(<PassesPanel onTable={() => undefined} />);
    expect(await screen.findAllByRole("option", { name: /^Pass \d/ })).toHaveLength(10);
    await userEvent.click(screen.getByRole("option", { name: "Pass 7" }));
    expect(store.getState().pass).toBe(7);
    expect(screen.getByRole("option", { name: "Pass 1, headland" })).toBeInTheDocument();
  });

  it("can be stepped through by keys, stopping at the ends", async () => {
    const { store } = renderInBook(<PassesPanel onTable={() => undefined} />, { state: { pass: 9 } });
    const list = await screen.findByRole("listbox");
    act(() => list.focus());
    await userEvent.keyboard("{ArrowRight}{ArrowRight}{ArrowLeft}");
    expect(store.getState().pass).toBe(9);
    expect(list).toHaveAttribute("aria-activedescendant", "pass-chart-9");
  });
});

describe("passes in groups", () => {
  it("say the difference with its interval, whether it may be none, and why there is none", async () => {
    renderInBook(<PassesPanel onTable={() => undefined} />);
    await show("groups");
    const direction = await screen.findByRole("region", { name: "Direction" });
    expect(direction).toHaveTextContent("North, 2° less south, 182°: 40 N (28 N to 52 N).");
    expect(screen.getByRole("region", { name: "Headland and inside" })).toHaveTextContent(
      "Headland less inside the field: −5.0 N (−20 N to 11 N); none at all cannot be ruled out.",
    );
    const speed = screen.getByRole("region", { name: "Speed, thirds of the distance" });
    expect(speed).toHaveTextContent("Fastest less slowest: −20 N. An interval needs 8 passes; this log has 5.");
    expect(within(speed).getByText(/slowest, 3.6 km\/h to 7.2 km\/h/)).toBeInTheDocument();
    expect(screen.getByRole("region", { name: "Turns" })).toHaveTextContent("No turn was driven with the rows down.");
  });

  it("are in the person's units", async () => {
    renderInBook(<PassesPanel onTable={() => undefined} />, { system: "imperial" });
    await show("groups");
    // 40 N / 4.4482216152605 = 9.0 lbf (NIST SP 811).
    expect(await screen.findByRole("region", { name: "Direction" })).toHaveTextContent("9.0 lbf");
  });
});

describe("starts and ends", () => {
  it("are drawn with their interval, and read metre by metre with the arrows", async () => {
    renderInBook(<PassesPanel onTable={() => undefined} />);
    await show("ramps");
    const chart = await screen.findByRole("slider", { name: "Starts and ends of passes, metre by metre" });
    expect(screen.getAllByTestId("ramp-interval")).toHaveLength(2);
    expect(screen.getAllByTestId("ramp-settled")).toHaveLength(1);
    act(() => chart.focus());
    await userEvent.keyboard("{ArrowRight}");
    expect(chart.getAttribute("aria-valuetext")!.replaceAll(/\s/g, " ")).toBe(
      "1.0 m to 2.0 m from the start: −20 N (−25 N to −15 N), 9 passes",
    );
    await userEvent.keyboard("{End}{ArrowRight}");
    expect(chart.getAttribute("aria-valuetext")).toMatch(/before the end/);
    expect(
      screen.getByText(/starts read 38.N below the middle of the pass and settle after 3.0.m\./),
    ).toBeInTheDocument();
  });

  it("are said to start as they go on, not to have settled, or not to be known", () => {
    const formats = { value: (n: number) => `${n} N`, distance: (m: number) => `${m} m` };
    const start = (settledAtM: number | null) => ({ ...RAMPS, start: { ...RAMPS.start, settledAtM } });
    expect(rampWords(start(0), formats)).toMatch(/^Passes start as they go on/);
    expect(rampWords(start(null), formats)).toMatch(/had not settled by 6 m\.$/);
    expect(rampWords({ ...RAMPS, reason: "Too few." }, formats)).toBe("Too few.");
  });
});

describe("the table of passes", () => {
  it("holds passes, groups and metres, and unrolls a pass", async () => {
    const { store } = renderInBook(<PassesTable onClose={() => undefined} />);
    await userEvent.click(await screen.findByRole("button", { name: "Unroll pass 4" }));
    expect(store.getState().pass).toBe(4);
    const tables = screen.getAllByRole("table");
    expect(tables).toHaveLength(3);
    expect(within(tables[1]!).getAllByRole("row")).toHaveLength(1 + 7);
    expect(within(tables[2]!).getAllByRole("row")).toHaveLength(1 + 12);
    expect(within(tables[0]!).queryByRole("columnheader", { name: /At the limit/ })).toBeNull();
  });
});

describe("the tabs", () => {
  it("show one panel at a time and are walked by arrows", async () => {
    renderInBook(
      <SideTabs
        tabs={[
          { id: "rows", label: "Rows", content: <p>rows here</p> },
          { id: "passes", label: "Passes", content: <p>passes here</p> },
        ]}
      />,
    );
    expect(screen.getByText("rows here")).toBeVisible();
    expect(screen.queryByText("passes here")).toBeNull();
    act(() => screen.getByRole("tab", { name: "Rows" }).focus());
    await userEvent.keyboard("{ArrowRight}");
    expect(screen.getByText("passes here")).toBeVisible();
    expect(screen.queryByText("rows here")).toBeNull();
  });
});
