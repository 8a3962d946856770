import { describe, expect, it } from "vitest";
import { MachineInput } from "@/lib/machines/machine";
import { LARKSPUR_COMBINE, LARKSPUR_DRILL } from "@/lib/simulator/scenario/larkspur-machines";

describe("a machine's numbers", () => {
  it("of the demo are within bounds", () => {
    expect(MachineInput.safeParse(LARKSPUR_DRILL).success).toBe(true);
    expect(MachineInput.safeParse(LARKSPUR_COMBINE).success).toBe(true);
  });

  it.each([
    { rowCount: 2, rowForwardM: [1e300, 1] },
    { rowCount: 2, rowOffsetsM: [-500, 500] },
    { antennaToRowsM: 1e308 },
    { antennaRightM: 500 },
    { rowUnitMassKg: 1e308 },
    { maxDownforceN: 1e12 },
    { frame: { ...LARKSPUR_DRILL.frame, wheelsBehindHitchM: 1e9 } },
    { name: "drill\r\nSubject: other" },
  ])("that no machine has are refused by name: %j", (change) => {
    const parsed = MachineInput.safeParse({ ...LARKSPUR_DRILL, ...change });
    const names = parsed.error?.issues.map((issue) => String(issue.path[0])) ?? [];
    expect(names).toContain(Object.keys(change).at(-1));
  });
});
