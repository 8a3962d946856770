import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { passVerdict } from "@/lib/findings/pass-verdict";
import { SIMULATION_DEFAULTS } from "@/lib/simulator/simulation-options";
import { makeLog } from "@/tests/support/make-log";

const ROWS = 6;
const MACHINE = { ...SIMULATION_DEFAULTS.machine, rowCount: ROWS, targetMarginN: 400, marginDeadbandN: 50 };

/** One straight pass of 101 records in which row 3 is under target on the first `under` of them. */
function judge(under: number) {
  const log = makeLog({
    records: Array.from({ length: 101 }, (_, i) => ({ eastM: 0, northM: 2 * i, timeS: i })),
    rows: ROWS,
    channels: [{ id: "margin", value: (record, row) => (row === 3 && record < under ? 300 : 420 + row) }],
  });
  const built = buildLog(log, MACHINE);
  if (!built.ok) throw new Error(built.error.message);
  return passVerdict(built.value.placed);
}

describe("a row counts as under target", () => {
  it("not when only the first metres of a pass were", () => {
    const verdict = judge(8);
    expect(verdict.rowsUnderTarget).toEqual([]);
    expect(verdict.findings.some(({ kind }) => kind === "target-held")).toBe(true);
  });

  it("to look at from a tenth of its distance, to act on from a quarter", () => {
    const severity = (under: number) =>
      judge(under).findings.find(({ kind }) => kind === "rows-under-target")?.severity;
    expect(judge(15).rowsUnderTarget).toEqual([3]);
    expect([severity(15), severity(30)]).toEqual(["look", "act"]);
  });
});
