import { screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { CleanedSwitch } from "@/components/cleaning/cleaned-switch";
import { CleaningLink } from "@/components/cleaning/cleaning-link";
import { useLogVersion } from "@/components/field-book/field-book-context";
import {
  useLogVerdict,
  useOverview,
  useRowStatistics,
  useTileJson,
  useTrack,
} from "@/components/field-book/use-log-data";
import { renderInBook } from "@/tests/components/field-book/render-in-book";

afterEach(() => vi.unstubAllGlobals());

/** Asks for everything that the rows page shows. */
function Asker() {
  const log = useLogVersion();
  useTileJson(log, "margin");
  useRowStatistics(log, "margin");
  useOverview(log, "margin");
  useTrack(log, "margin", 3);
  useLogVerdict(log, true);
  return null;
}

describe("the line that says whether rules apply", () => {
  it("is not there where they change nothing", () => {
    renderInBook(<CleanedSwitch />, { log: { revision: 0 } });
    expect(screen.queryByRole("group", { name: "Readings shown" })).toBeNull();
  });

  it("changes map, line-up, pass and verdict together", async () => {
    const asked: string[] = [];
    vi.stubGlobal("fetch", async (path: string) => {
      asked.push(path);
      return new Response("", { status: 404 });
    });
    const { store } = renderInBook(
      <>
        <CleanedSwitch />
        <Asker />
      </>,
      { log: { revision: 2 } },
    );
    await vi.waitFor(() => expect(asked).toHaveLength(5));
    expect(asked.filter((path) => path.includes("cleaned"))).toEqual([]);
    await userEvent.click(screen.getByRole("radio", { name: "as logged" }));
    expect(store.getState().cleaned).toBe(false);
    await vi.waitFor(() => expect(asked).toHaveLength(10));
    expect(asked.slice(5).map((path) => path.replace("/api/v1/logs/log_east/", ""))).toEqual(
      expect.arrayContaining([
        "tiles/margin/tiles.json?cleaned=false",
        "rows?channel=margin&cleaned=false",
        "overview?channel=margin&cleaned=false",
        "passes/3/readings?channel=margin&cleaned=false&values=packed",
        "verdict?cleaned=false",
      ]),
    );
  });

  it("leads to the rules, and says whether they do anything", () => {
    renderInBook(<CleaningLink logsHref="/larkspur/fields/fld_1/logs" />, { log: { revision: 2 } });
    expect(screen.getByRole("link", { name: "Cleaning rules" })).toHaveAttribute(
      "href",
      "/larkspur/fields/fld_1/logs/log_east/cleaning",
    );
    expect(screen.getByText(/leave readings out/)).toBeVisible();
  });
});
