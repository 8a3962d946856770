import { act, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { beforeAll, describe, expect, it } from "vitest";
import { LineUp } from "@/components/field-book/line-up";
import { LineUpChart } from "@/components/field-book/line-up-chart";
import { lineUpColumns } from "@/components/field-book/line-up-columns";
import { LineUpTable } from "@/components/field-book/line-up-table";
import { tableText } from "@/components/ui/table-text";
import { csvCell } from "@/components/ui/write-csv";
import { giveElementsSize, renderInBook, STATISTICS } from "./render-in-book";

beforeAll(() => giveElementsSize(380, 260));

describe("the line-up's chart", () => {
  it("offers every row, and a click lights it everywhere", async () => {
    const { store } = renderInBook(<LineUpChart statistics={STATISTICS} classes={null} />);
    expect(screen.getAllByRole("option")).toHaveLength(8);
    await userEvent.click(screen.getByRole("option", { name: "Row 5, stands out" }));
    expect(store.getState().row).toBe(5);
    expect(screen.getByRole("option", { name: "Row 5, stands out" })).toHaveAttribute("aria-selected", "true");
  });

  it("can be walked through with the arrow keys, stopping at the ends", async () => {
    const { store } = renderInBook(<LineUpChart statistics={STATISTICS} classes={null} />, { state: { row: 7 } });
    act(() => screen.getByRole("listbox").focus());
    await userEvent.keyboard("{ArrowRight}{ArrowRight}{ArrowRight}");
    expect(store.getState().row).toBe(8);
    await userEvent.keyboard("{ArrowLeft}{ArrowLeft}");
    expect(store.getState().row).toBe(6);
  });

  it("names what stands out by a shape of its own, not by colour alone", () => {
    const { container } = renderInBook(<LineUpChart statistics={STATISTICS} classes={null} />);
    const marks = [...container.querySelectorAll("[data-row] rect[fill='#9A4A2C']")];
    expect(marks.map((mark) => mark.closest("[data-row]")?.getAttribute("data-row"))).toEqual(["5"]);
  });
});

describe("the line-up of a reading of names", () => {
  const named = (row: number, classShares?: number[]) => ({ ...STATISTICS.items[0]!, row, p50: null, classShares });
  const statistics = {
    ...STATISTICS,
    channel: "marginByForce",
    items: [named(1, [0, 0.25, 0, 0.75, 0, 0]), named(2, [0, 0, 0, 1, 0, 0]), named(3)],
  };

  it("shows each row's share of distance under each name, and says it", async () => {
    const { container, store } = renderInBook(
      <LineUp statistics={statistics} classes={null} onTable={() => undefined} />,
    );
    const options = screen.getAllByRole("option");
    expect(options.map((option) => option.getAttribute("aria-label"))).toEqual([
      expect.stringMatching(/^Row 1: .+ 25\u202f?%; .+ 75\u202f?% of distance$/),
      expect.stringMatching(/^Row 2: [^;]+ 100\u202f?% of distance$/),
      "Row 3: no readings",
    ]);
    const heights = [...options[0]!.querySelectorAll<HTMLElement>("[data-code]")].map(({ style }) => style.height);
    expect(heights.filter((height) => height !== "0%")).toEqual(["25%", "75%"]);
    await userEvent.click(options[1]!);
    expect(store.getState().row).toBe(2);
    expect(container.textContent).not.toContain("median");
  });
});

describe("the line-up's table", () => {
  it("shows numbers in the person's units", () => {
    renderInBook(<LineUpTable statistics={STATISTICS} onClose={() => undefined} />, { system: "imperial" });
    const row = screen.getByRole("button", { name: "Show row 5 everywhere" }).closest("tr")!;
    // 300 N / 4.4482216152605 = 67.4 lbf; 1450.5 m / 0.3048 = 4758.9 ft (NIST SP 811).
    expect(within(row).getByText("67")).toBeInTheDocument();
    expect(within(row).getByText("4759")).toBeInTheDocument();
    expect(screen.getByRole("columnheader", { name: "Median, lbf" })).toBeInTheDocument();
  });

  it("sorts by a column", async () => {
    renderInBook(<LineUpTable statistics={STATISTICS} onClose={() => undefined} />);
    await userEvent.click(screen.getByRole("button", { name: "Median, N" }));
    const first = screen.getAllByRole("button", { name: /everywhere$/ })[0]!;
    expect(first).toHaveAccessibleName("Show row 5 everywhere");
  });

  it("finds rows by what is written in them", async () => {
    renderInBook(<LineUpTable statistics={STATISTICS} onClose={() => undefined} />);
    await userEvent.type(screen.getByRole("searchbox"), "lower than");
    expect(screen.getAllByRole("button", { name: /everywhere$/ })).toHaveLength(1);
  });

  it("keeps missing apart from 0 in what is copied, and guards formulas", () => {
    const columns = lineUpColumns(STATISTICS, "metric");
    const lines = tableText(columns, STATISTICS.items).split("\n");
    const header = lines[0]!.split("\t");
    const cells = lines[5]!.split("\t");
    // No row of a margin has a share at the limit: no column of dashes.
    expect(header).not.toContain("At the limit, of distance, %");
    expect(header.slice(0, 3)).toEqual(["Row", "Stands out", "Why"]);
    expect(lines[1]!.split("\t")[2]).toBe("");
    expect(cells[header.indexOf("Contact lost, of distance, %")]).toBe("0");
    expect(cells[header.indexOf("Under target, of distance, %")]).toBe("81");
    expect(cells[2]).toBe("'=lower than the others");
    expect(csvCell("=1+1")).toBe("'=1+1");
  });

  it("shows z with two decimals", () => {
    renderInBook(<LineUpTable statistics={STATISTICS} onClose={() => undefined} />);
    expect(screen.getByText("\u22126.20")).toBeInTheDocument();
  });

  it("holds every number of the statistics", () => {
    const items = STATISTICS.items.map((item) => ({ ...item, shareAtLimit: 0.1 }));
    const ids = lineUpColumns({ ...STATISTICS, items }, "metric").map((column) => column.id);
    expect(ids).toEqual(expect.arrayContaining(Object.keys(STATISTICS.items[0]!)));
  });
});
