import { screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import axe from "axe-core";
import { describe, expect, it } from "vitest";
import { ExportMenu } from "@/components/export/export-menu";
import { LOG, renderInBook } from "@/tests/components/field-book/render-in-book";
import { ExportQuery } from "@/lib/schemas/export";

async function openMenu(): Promise<HTMLElement[]> {
  await userEvent.click(screen.getByRole("button", { name: "Export East quarter, first day" }));
  return screen.findAllByRole("menuitem");
}

const hrefOf = (item: HTMLElement) => new URL(item.getAttribute("href")!, "http://localhost");

describe("the export menu", () => {
  it("offers files that the server takes, each with its size where it is known", async () => {
    renderInBook(<ExportMenu log={LOG} />);
    const items = await openMenu();
    expect(items).toHaveLength(9);
    for (const item of items) {
      const { pathname, searchParams } = hrefOf(item);
      expect(pathname).toBe("/api/v1/logs/log_east/export");
      expect(ExportQuery.safeParse(Object.fromEntries(searchParams)).success).toBe(true);
      expect(item).toHaveProperty("download");
    }
    expect(items[0]!.textContent).toMatch(/^CSV, one line a row ?about \d+\s?(kB|MB)$/);
    expect(hrefOf(items[0]!).searchParams.get("bundle")).toBe("zip");
    expect(hrefOf(items[1]!).searchParams.get("shape")).toBe("wide");
  });

  it("says whether the rules leave readings out of the files", async () => {
    const { unmount } = renderInBook(<ExportMenu log={LOG} />);
    await openMenu();
    expect(screen.getByText(/^Readings as shown: with the cleaning rules/)).toBeTruthy();
    unmount();
    renderInBook(<ExportMenu log={LOG} cleaned={false} />);
    await openMenu();
    expect(screen.getByText(/^Readings as logged/)).toBeTruthy();
    expect(screen.queryByText(/with the cleaning rules/)).toBeNull();
  });

  it("adds zones where a channel is coloured, with its edges", async () => {
    renderInBook(<ExportMenu log={LOG} zones={{ channel: "margin", edges: [200, 450] }} />);
    const zones = (await openMenu()).map(hrefOf).filter(({ searchParams }) => searchParams.get("level") === "zones");
    expect(zones).toHaveLength(3);
    for (const { searchParams } of zones) {
      expect(ExportQuery.parse(Object.fromEntries(searchParams))).toMatchObject({
        channel: "margin",
        breaks: [200, 450],
      });
    }
  });

  it("is walked by keys and has no fault that axe finds", async () => {
    renderInBook(<ExportMenu log={LOG} />);
    await userEvent.tab();
    await userEvent.keyboard("{Enter}");
    await screen.findAllByRole("menuitem");
    expect(document.activeElement?.textContent).toContain("CSV, one line a row");
    await userEvent.keyboard("{ArrowDown}{ArrowDown}");
    expect(document.activeElement?.textContent).toContain("GeoPackage");
    const { violations } = await axe.run(screen.getByRole("menu"), { rules: { region: { enabled: false } } });
    expect(violations.map(({ id, help }) => `${id}: ${help}`)).toEqual([]);
  });
});
