import { screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it, vi } from "vitest";
import { rowWords, VerdictPanel } from "@/components/field-book/verdict-panel";
import { verdictKnown } from "@/components/field-book/verdict-known";
import type { Finding, VerdictBody } from "@/lib/schemas/logs";
import { renderInBook } from "./render-in-book";

function finding(part: Partial<Finding>): Finding {
  return {
    id: "f1",
    kind: "row",
    severity: "look",
    sentence: "Row 5 carried 151 N less than its neighbours.",
    value: 151,
    unit: "N",
    interval: null,
    confidence: "high",
    method: "row deviation",
    place: null,
    check: "Check its disc and bushing.",
    caution: null,
    ...part,
  };
}

const VERDICT: VerdictBody = {
  rowsUnderTarget: [3, 5],
  rowsAtLimit: [],
  weight: { headroomN: null, shareLiftedM2: null, state: "unknown" },
  findings: [
    finding({ id: "fine", severity: "ok", sentence: "Speed was even." }),
    finding({
      id: "row-5",
      severity: "act",
      row: 5,
      sentenceTemplate: "Row 5 carried {less} less than its neighbours.",
      values: { less: { value: 151, unit: "N" } },
      place: {
        type: "LineString",
        coordinates: [
          [-98.61, 38.41],
          [-98.6, 38.42],
        ],
      },
      caution: "Lower the machine before reaching under it.",
    }),
  ],
};

const PLACE = { logsHref: "/larkspur/fields/fld_east/logs", openFirst: false };

describe("the verdict", () => {
  it("puts one number first and the pressing findings before the rest", () => {
    renderInBook(<VerdictPanel verdict={VERDICT} rows={8} trouble={false} {...PLACE} />);
    expect(screen.getByText("rows ran under target")).toBeInTheDocument();
    expect(screen.getAllByRole("listitem").map((item) => item.dataset.severity)).toEqual(["act", "ok"]);
  });

  it("says numbers in the reader's units", () => {
    renderInBook(<VerdictPanel verdict={VERDICT} rows={8} trouble={false} {...PLACE} />, { system: "imperial" });
    // 151 N = 33.9 lbf (NIST SP 811).
    expect(screen.getByText(/Row 5 carried 34 lbf less/)).toBeInTheDocument();
  });

  it("folds the check away and shows the caution with it, announced beforehand", async () => {
    renderInBook(<VerdictPanel verdict={VERDICT} rows={8} trouble={false} {...PLACE} />);
    expect(screen.getByText(/Lower the machine before reaching under it/)).not.toBeVisible();
    await userEvent.click(screen.getByText(/What to check, and a caution/));
    expect(screen.getByText(/Lower the machine before reaching under it/)).toBeVisible();
  });

  it("moves selection and map only when asked", async () => {
    const { store } = renderInBook(<VerdictPanel verdict={VERDICT} rows={8} trouble={false} {...PLACE} />);
    expect(store.getState().row).toBeNull();
    expect(store.getState().frame).toBeNull();
    await userEvent.click(screen.getByRole("button", { name: "See it: row 5" }));
    expect(store.getState().row).toBe(5);
    expect(store.getState().frame?.bounds).toEqual([-98.61, 38.41, -98.6, 38.42]);
    await userEvent.click(screen.getByRole("button", { name: "See it: row 5" }));
    expect(store.getState().row).toBe(5);
    expect(store.getState().frame?.wish).toBe(2);
  });

  it("brings the map into sight", async () => {
    const region = document.createElement("div");
    region.setAttribute("role", "region");
    region.setAttribute("aria-label", "Map");
    region.scrollIntoView = vi.fn();
    document.body.append(region);
    renderInBook(<VerdictPanel verdict={VERDICT} rows={8} trouble={false} {...PLACE} />);
    await userEvent.click(screen.getByRole("button", { name: "See it: row 5" }));
    expect(region.scrollIntoView).toHaveBeenCalledTimes(1);
    region.remove();
  });

  it("says after cleaning how much is left out of it, and the way to the rules", () => {
    const cleaned = { ...VERDICT, leftOutShare: 0.2884 };
    renderInBook(<VerdictPanel verdict={cleaned} rows={8} trouble={false} {...PLACE} />);
    expect(screen.getByTestId("left-out")).toHaveTextContent(/^After cleaning: 28\.8\s?% of readings left out$/);
    const link = screen.getByRole("link", { name: /28\.8\s?% of readings left out/ });
    expect(link).toHaveAttribute("href", `${PLACE.logsHref}/log_east/cleaning`);
  });

  it.each([0, undefined])("says nothing of cleaning where %s of it is left out", (leftOutShare) => {
    renderInBook(<VerdictPanel verdict={{ ...VERDICT, leftOutShare }} rows={8} trouble={false} {...PLACE} />);
    expect(screen.queryByText(/After cleaning/)).toBeNull();
  });

  it("says that it is not known which rows were under target, and the way to the machine", () => {
    const unjudged = { ...VERDICT, rowsUnderTarget: [], findings: [], known: { underTarget: false, atLimit: false } };
    renderInBook(<VerdictPanel verdict={unjudged} rows={8} trouble={false} {...PLACE} />);
    expect(screen.getByText("Not known")).toBeInTheDocument();
    expect(screen.queryByText("rows ran under target")).not.toBeInTheDocument();
    expect(screen.queryByText(/No row at its force limit/)).not.toBeInTheDocument();
    expect(screen.getByRole("link", { name: "Choose the machine" })).toHaveAttribute("href", PLACE.logsHref);
  });

  it("counts none under target where that is known", () => {
    const held = { ...VERDICT, rowsUnderTarget: [], findings: [], known: { underTarget: true, atLimit: true } };
    renderInBook(<VerdictPanel verdict={held} rows={8} trouble={false} {...PLACE} />);
    expect(screen.getByText("rows ran under target")).toBeInTheDocument();
    expect(screen.getByText(/No row at its force limit/)).toBeInTheDocument();
  });

  it("tells from the findings of an older verdict what was known", () => {
    const log = { machineId: null };
    expect(verdictKnown({ ...VERDICT, rowsUnderTarget: [], findings: [] }, log).underTarget).toBe(false);
    const held = [finding({ kind: "target-held" })];
    expect(verdictKnown({ ...VERDICT, rowsUnderTarget: [], findings: held }, log).underTarget).toBe(true);
  });

  it("judges no seeding in a harvest log", () => {
    renderInBook(<VerdictPanel verdict={undefined} rows={8} trouble={false} {...PLACE} />, {
      log: { kind: "harvest" },
    });
    expect(screen.getByText("Harvest log")).toBeInTheDocument();
    expect(screen.queryByText("Verdict")).not.toBeInTheDocument();
  });

  it("shows the first finding's check unfolded where there is room", () => {
    renderInBook(<VerdictPanel verdict={VERDICT} rows={8} trouble={false} {...PLACE} openFirst />);
    expect(screen.getByText(/Lower the machine before reaching under it/)).toBeVisible();
    expect(screen.getAllByRole("group").filter((group) => group.hasAttribute("open"))).toHaveLength(1);
  });

  it("unrolls the pass that a finding lies on", async () => {
    const reading = { pass: 4, record: 7, time: null, row: 5, headingDeg: 0, speedMps: 2, values: {}, flags: [] };
    const ask = vi.fn(() => Promise.resolve(new Response(JSON.stringify(reading), { status: 200 })));
    vi.stubGlobal("fetch", ask);
    const { store } = renderInBook(<VerdictPanel verdict={VERDICT} rows={8} trouble={false} {...PLACE} />);
    await userEvent.click(screen.getByRole("button", { name: "See it: row 5" }));
    await vi.waitFor(() => expect(store.getState().pass).toBe(4));
    vi.unstubAllGlobals();
  });

  it("says so when it could not be fetched", () => {
    renderInBook(<VerdictPanel verdict={undefined} rows={8} trouble {...PLACE} />);
    expect(screen.getByRole("alert")).toHaveTextContent("could not be fetched");
  });

  it("names rows the way people do", () => {
    expect(rowWords([17])).toBe("Row 17");
    expect(rowWords([3, 4, 17])).toBe("Rows 3, 4 and 17");
    expect(rowWords([9, 3, 4, 5, 6, 7, 8])).toBe("Rows 3 to 9");
    expect(rowWords([1, 2, 3, 10])).toBe("Rows 1 to 3 and 10");
  });
});
