// A combine's log: one value a record for the whole header.
import { describe, expect, it } from "vitest";
import { adjustLog } from "@/lib/adjustments/adjust-log";
import type { Adjustments } from "@/lib/adjustments/adjustments";
import { buildLog } from "@/lib/build/build-log";
import { resolveChannel } from "@/lib/channels/resolve-channel";
import { ruleNumber } from "@/lib/cleaning/rule-catalogue";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { LARKSPUR } from "@/lib/simulator/scenario/larkspur";
import { simulateHarvestLog } from "@/lib/simulator/simulate-harvest-log";
import { rulesWith } from "@/tests/lib/cleaning/make-placed";

function simulate(seed: number): PlacedLog {
  const { input } = LARKSPUR.fields[0]!.harvest;
  const { log } = simulateHarvestLog({ ...input, seed });
  const built = buildLog(log, null, { workingWidthM: input.combine.headerWidthM });
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}
const withRules = (changes: Parameters<typeof rulesWith>[0]): Adjustments => ({
  delaysS: {},
  cleaning: rulesWith(changes),
});
const flowOf = (placed: PlacedLog) => placed.log.channels.find((channel) => channel.id === "yieldFlow")!;
const missing = (placed: PlacedLog) =>
  Array.from(flowOf(placed).values).flatMap((value, record) => (Number.isNaN(value) ? [record] : []));

describe("a log with one value a record", () => {
  it("loses hardly anything that was not put in", () => {
    for (let seed = 1; seed <= 5; seed++) {
      const placed = simulate(seed);
      const inPasses = placed.passOf.filter((pass) => pass > 0).length;
      const { placed: cleaned } = adjustLog(placed, withRules({ "local-outlier": { on: true } }));
      const out = missing(cleaned).length - missing(placed).length;
      expect({ seed, isFew: out / inPasses < 0.005 }).toEqual({ seed, isFew: true });
    }
  });

  it("is judged by itself close by: a spike goes", () => {
    const placed = simulate(1);
    const at = placed.passes[2]!.first + 25;
    const values = Float32Array.from(flowOf(placed).values);
    values[at] = values[at]! * 3;
    const channels = placed.log.channels.map((channel) =>
      channel.id === "yieldFlow" ? { ...channel, values } : channel,
    );
    const spiked = { ...placed, log: { ...placed.log, channels } };
    const rules = withRules({ "local-outlier": { on: true, withinM: 20 } });
    expect(missing(adjustLog(spiked, rules).placed)).toContain(at);
  });

  it("is out where its whole width stands on ground worked before, and says so in every row of the map", () => {
    const placed = simulate(1);
    const second = placed.passes[1]!;
    const first = placed.passes[0]!;
    // The second pass is laid over the first.
    const [east, north] = [Float64Array.from(placed.originEastM), Float64Array.from(placed.originNorthM)];
    const heading = Float32Array.from(placed.headingDeg);
    const count = Math.min(first.records, second.records);
    for (let k = 0; k < count; k++) {
      east[second.first + k] = placed.originEastM[first.first + k]!;
      north[second.first + k] = placed.originNorthM[first.first + k]!;
      heading[second.first + k] = placed.headingDeg[first.first + k]!;
    }
    const twice = { ...placed, originEastM: east, originNorthM: north, headingDeg: heading };
    const { placed: cleaned } = adjustLog(twice, withRules({ overlap: { on: true, minApartS: 0 } }));
    const out = missing(cleaned).filter((record) => !missing(placed).includes(record));
    const inside = (record: number) => record > second.first && record < second.first + count - 1;
    expect(out.filter(inside).length).toBeGreaterThan(0.9 * (count - 2));
    const flags = resolveChannel(cleaned, "flags")!;
    const middle = second.first + Math.floor(count / 2);
    const row = flags.values.subarray(middle * flags.rows, (middle + 1) * flags.rows);
    expect(new Set(row)).toEqual(new Set([ruleNumber("overlap")]));
  });
});
