import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { passVerdict } from "@/lib/findings/pass-verdict";
import type { Seeder } from "@/lib/machines/machine";
import { LARKSPUR, LARKSPUR_NEXT_DAY } from "@/lib/simulator/scenario/larkspur";
import { LARKSPUR_DRILL, LARKSPUR_DRILL_BALLASTED } from "@/lib/simulator/scenario/larkspur-machines";
import { simulateSeedingLog, type SimulatedLog } from "@/lib/simulator/simulate-seeding-log";

function weigh({ log }: SimulatedLog, machine: Seeder) {
  const built = buildLog(log, machine);
  if (!built.ok) throw new Error(built.error.message);
  const verdict = passVerdict(built.value.placed);
  return { ...verdict.weight, finding: verdict.findings.find(({ kind }) => kind.startsWith("weight-")) };
}

describe("the weight of the frame", () => {
  it("is not judged by a machine that the log contradicts", () => {
    const nextDay = simulateSeedingLog(LARKSPUR_NEXT_DAY.input);
    const light = {
      ...LARKSPUR_DRILL,
      frame: { ...LARKSPUR_DRILL.frame!, massKg: LARKSPUR_DRILL.frame!.massKg * 0.8 },
    };
    const weight = weigh(nextDay, light);
    expect(weight.state).toBe("unknown");
    expect(weight.finding?.sentence).toMatch(
      /a machine whose description fits this log .* yet the rows held their margin/,
    );
    expect(weight.finding?.severity).toBe("look");
    expect(weigh(nextDay, LARKSPUR_DRILL_BALLASTED).state).toBe("enough");
  });

  it("is judged where the rows lost their margin with it", () => {
    const east = LARKSPUR.fields.find(({ key }) => key === "east-quarter")!;
    expect(weigh(simulateSeedingLog(east.seeding.input), LARKSPUR_DRILL).state).toBe("short");
  });
});
