import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { passVerdict } from "@/lib/findings/pass-verdict";
import { geodesicDistanceM } from "@/lib/geo/geodesic-distance";
import { LARKSPUR } from "@/lib/simulator/scenario/larkspur";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

/** Hand-worked: the wheels carry nothing from 1000 kg x 9.80665 x 2 m / (4 rows x 5 m) = 980.665 N a row. */
const FRAME = {
  massKg: 1000,
  behindHitchM: 2,
  wheelsBehindHitchM: 4,
  rowsBehindHitchM: 5,
  ballast: [],
  minWheelLoadN: 500,
};

/** One pass of 2001 records half a metre apart; `isHigh` says where the force lifts the frame. */
function judge(isHigh: (record: number) => boolean) {
  const log = makeLog({
    records: straightTrack({ from: [0, 0], headingDeg: 0, records: 2001 }),
    channels: [{ id: "downforce", value: (record) => (isHigh(record) ? 1200 : 500) }],
  });
  const built = buildLog(log, makeSeeder({ frame: FRAME }));
  if (!built.ok) throw new Error(built.error.message);
  const finding = passVerdict(built.value.placed).findings.find(({ kind }) => kind === "weight-short");
  const { place } = finding!;
  if (place?.type !== "MultiLineString") throw new Error("no lines");
  return place.coordinates.map((line) => ({
    corners: line.length,
    lengthM: geodesicDistanceM(line[0]!, line.at(-1)!),
  }));
}

describe("the place of too little weight", () => {
  it("is every stretch with the frame lifted, the longest first", () => {
    const lines = judge((record) => (record >= 100 && record <= 140) || (record >= 900 && record <= 1100));
    expect(lines.map(({ lengthM }) => Math.round(lengthM))).toEqual([100, 20]);
  });

  it("is at most fifty lines of few corners, the longest of them all", () => {
    const lines = judge((record) => record % 20 < (record < 1000 ? 6 : 10));
    expect(lines).toHaveLength(50);
    expect(lines.every(({ lengthM }) => Math.abs(lengthM - 4.5) < 0.01)).toBe(true);
    expect(Math.max(...judge(() => true).map(({ corners }) => corners))).toBeLessThanOrEqual(14);
  });

  it("shows the lifted share of the demo field that its sentence speaks of", () => {
    const { log, truth } = simulateSeedingLog(LARKSPUR.fields[0]!.seeding.input);
    const built = buildLog(log, truth.options.machine);
    if (!built.ok) throw new Error(built.error.message);
    const verdict = passVerdict(built.value.placed);
    const { place } = verdict.findings.find(({ kind }) => kind === "weight-short")!;
    expect(place?.type).toBe("MultiLineString");
    expect(place!.coordinates.length).toBeGreaterThan(3);
  });
});
