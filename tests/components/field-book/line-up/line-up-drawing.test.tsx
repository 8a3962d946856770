import { act, screen, waitFor } from "@testing-library/react";
import { beforeAll, beforeEach, describe, expect, it, vi } from "vitest";
import { queryKeys } from "@/components/hooks/query-keys";
import { LineUp } from "@/components/field-book/line-up";
import { LineUpChart } from "@/components/field-book/line-up-chart";
import { logVersionKey } from "@/components/field-book/use-log-data";
import { giveElementsSize, LOG, renderInBook, STATISTICS } from "@/tests/components/field-book/render-in-book";

beforeAll(() => giveElementsSize(380, 420));
// Nothing is asked of a server here: what is known is put into the cache.
beforeEach(() => vi.stubGlobal("fetch", () => new Promise(() => undefined)));

const DRILL = {
  id: "mac_drill",
  createdAt: "2031-09-01T00:00:00.000Z",
  updatedAt: "2031-09-01T00:00:00.000Z",
  kind: "seeder",
  name: "8-row drill",
  rowCount: 8,
  rowSpacingM: 0.25,
  antennaToRowsM: 4,
  antennaRightM: 0,
  hitch: "rigid",
  rowUnitMassKg: 82,
  wings: [3, 2, 3],
  sections: [4, 4],
};

describe("the line-up as the toolbar is laid out", () => {
  it("draws wings with their joints, sections, and wheels before the rows in their tracks", async () => {
    const statistics = { ...STATISTICS, wheelTrackRows: [3, 6] };
    const { client } = renderInBook(<LineUpChart statistics={statistics} classes={null} />, {
      log: { machineId: DRILL.id },
    });
    expect(screen.queryAllByTestId("wing-joint")).toHaveLength(0);
    act(() => client.setQueryData(queryKeys.machines, { items: [DRILL], nextCursor: null }));
    await waitFor(() => expect(screen.getAllByTestId("wing-joint")).toHaveLength(2));
    expect(screen.getAllByTestId("section")).toHaveLength(2);
    expect(screen.getAllByTestId("wheel-track")).toHaveLength(2);
  });

  it("leaves a wider gap between rows where there is one", async () => {
    const { client, container } = renderInBook(<LineUpChart statistics={STATISTICS} classes={null} />, {
      log: { machineId: DRILL.id },
    });
    const rowOffsetsM = [-1.5, -1.25, -1, -0.75, 0.75, 1, 1.25, 1.5];
    act(() => client.setQueryData(queryKeys.machines, { items: [{ ...DRILL, rowOffsetsM }], nextCursor: null }));
    const left = (row: number) => Number(container.querySelector(`[data-row="${row}"] > rect`)!.getAttribute("x"));
    // 1.5 m between rows 4 and 5 against 0.25 m between 3 and 4.
    await waitFor(() => expect((left(5) - left(4)) / (left(4) - left(3))).toBeCloseTo(6, 5));
  });

  it("draws the score of each row with its limits, and marks one that is cut off", () => {
    const items = STATISTICS.items.map((item) => (item.row === 5 ? { ...item, deviationZ: -81 } : item));
    renderInBook(<LineUpChart statistics={{ ...STATISTICS, items }} classes={null} />);
    expect(screen.getAllByTestId("score-limit")).toHaveLength(2);
    const cut = screen.getAllByTestId("score-cut");
    expect(cut.map((mark) => mark.closest("[data-score-row]")!.getAttribute("data-score-row"))).toEqual(["5"]);
  });

  it("shows shares under target and at the limit together, whatever the channel", async () => {
    const { client } = renderInBook(
      <LineUpChart statistics={{ ...STATISTICS, channel: "depth", unit: "m" }} classes={null} />,
    );
    const version = { logId: LOG.id, version: LOG.version };
    const forces = STATISTICS.items.map((item) => ({ ...item, shareUnderTarget: null, shareAtLimit: 0.25 }));
    act(() => {
      client.setQueryData(logVersionKey(version, "rows", "margin"), STATISTICS);
      client.setQueryData(logVersionKey(version, "rows", "downforce"), { ...STATISTICS, items: forces });
    });
    const limit = await screen.findByTestId("share-at-limit");
    const under = screen.getByTestId("share-under-target");
    const heights = (strip: HTMLElement) =>
      [...strip.querySelectorAll("rect")].map((bar) => bar.getAttribute("height"));
    expect(heights(limit)).toEqual(Array.from({ length: 8 }, () => "5.5"));
    expect(Number(heights(under)[4])).toBeCloseTo(22 * 0.81, 6);
  });
});

describe("the rule", () => {
  it("is said in words, with 5 % of this log's median row in the person's units", () => {
    const statistics = { ...STATISTICS, medianOfRows: 444.822, wheelTrackRows: [3, 6] };
    renderInBook(<LineUp statistics={statistics} classes={null} onTable={() => undefined} />, { system: "imperial" });
    // 5 % of 444.822 N are 22.24 N, 5.0 lbf (NIST SP 811).
    expect(screen.getByText(/Stands out: z beyond 3.5 either way, and more than 5.% \(5.0.lbf\)/)).toBeInTheDocument();
    expect(screen.getByText(/Rows 3, 6 run in wheel tracks/)).toBeInTheDocument();
  });

  it("is not said where rows cannot be ranked", () => {
    const items = STATISTICS.items.map((item) => ({ ...item, deviationZ: null }));
    renderInBook(<LineUp statistics={{ ...STATISTICS, items }} classes={null} onTable={() => undefined} />);
    expect(screen.queryByText(/Stands out/)).toBeNull();
  });
});
