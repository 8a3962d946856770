import { describe, expect, it } from "vitest";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";

describe("simulateSeedingLog", () => {
  it("gives the same log for the same seed and another for another", () => {
    const first = simulateSeedingLog({ seed: 5 }).log;
    const again = simulateSeedingLog({ seed: 5 }).log;
    const other = simulateSeedingLog({ seed: 6 }).log;
    expect(again).toEqual(first);
    expect(other.channels[0]?.values).not.toEqual(first.channels[0]?.values);
  });
});
