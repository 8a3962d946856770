import { describe, expect, it } from "vitest";
import { frameMomentNm, liftOffForceN, measureFrameBalance, wheelLoadN } from "@/lib/ballast/frame-balance";
import { buildLog } from "@/lib/build/build-log";
import type { Seeder } from "@/lib/machines/machine";
import { rowDistances } from "@/lib/rows/row-distances";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

const FRAME: NonNullable<Seeder["frame"]> = {
  massKg: 3000,
  behindHitchM: 4,
  wheelsBehindHitchM: 4.5,
  rowsBehindHitchM: 5.2,
  ballast: [{ massKg: 600, behindHitchM: 4.8 }],
  minWheelLoadN: 1500,
};

describe("the balance about the hitch pin", () => {
  it("leaves 7467 N on the wheels under 900 N on each of 24 rows (hand-worked statics)", () => {
    expect(wheelLoadN(FRAME, 24 * 900 * 5.2)).toBeCloseTo(7467, 0);
  });
  it("lifts off at 1169 N a row (hand-worked statics)", () => {
    expect(liftOffForceN(FRAME, 24)).toBeCloseTo(1169, 0);
    expect(wheelLoadN(FRAME, frameMomentNm(FRAME))).toBe(0);
  });
});

function balance(force: (record: number, row: number) => number, machine: Partial<Seeder> = { frame: FRAME }) {
  const log = makeLog({
    rows: 24,
    records: straightTrack({ from: [0, 0], headingDeg: 20, records: 200 }),
    channels: [{ id: "downforce", value: force }],
  });
  const built = buildLog(log, makeSeeder({ rowCount: 24, ...machine }));
  if (!built.ok) throw new Error(built.error.message);
  return measureFrameBalance(built.value.placed, rowDistances(built.value.placed));
}

describe("measureFrameBalance", () => {
  it("has headroom above the least wheel load (hand-worked: 7467 - 1500)", () => {
    const found = balance(() => 900);
    expect(found.state).toBe("enough");
    expect(found.headroomN?.p50).toBeCloseTo(5967, 0);
    expect(found.shareLiftedM2).toBe(0);
  });

  it("is short where a tenth of the ground lifts the frame", () => {
    const found = balance((record) => (record >= 100 && record < 120 ? 1180 : 900));
    expect(found.state).toBe("short");
    expect(found.shareLiftedM2).toBeCloseTo(0.1, 2);
    expect(found.lifts.map((lift) => lift.firstRecord)).toEqual([100]);
    expect(found.lifts[0]!.lengthM).toBeCloseTo(10, 1);
  });

  it("lets missing rows take the mean of the others, but not more than half of them", () => {
    expect(balance((_, row) => (row <= 4 ? NaN : 900)).headroomN?.p50).toBeCloseTo(5967, 0);
    expect(balance((_, row) => (row <= 13 ? NaN : 900)).state).toBe("unknown");
  });

  it("says what it would need where the frame is not described", () => {
    const found = balance(() => 900, {});
    expect(found.state).toBe("unknown");
    expect(found.missing.join()).toContain("weight of the frame");
  });
});
