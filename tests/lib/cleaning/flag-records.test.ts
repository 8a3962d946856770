import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { flagCodes } from "@/lib/cleaning/flags";
import { rowDistances } from "@/lib/rows/row-distances";
import type { MachineLog } from "@/lib/logs/machine-log";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

const CHANNELS = [{ id: "downforce" as const, value: () => 900 }];
const straight = () =>
  makeLog({ records: straightTrack({ from: [0, 0], headingDeg: 0, records: 100 }), channels: CHANNELS });

function place(log: MachineLog) {
  const built = buildLog(log, makeSeeder());
  if (!built.ok) throw new Error(built.error.message);
  return built.value;
}

describe("flags", () => {
  it("are none on a clean log", () => {
    const { placed, notes } = place(straight());
    expect(placed.flags.every((bits) => bits === 0)).toBe(true);
    expect(notes).toEqual([]);
  });

  it("mark positions at 0, 0, missing and out of range, and keep the pass whole", () => {
    const log = straight();
    log.longitude[10] = log.latitude[10] = 0;
    log.longitude[30] = NaN;
    log.latitude[50] = 91;
    const { placed, notes } = place(log);
    for (const record of [10, 30, 50]) {
      expect(flagCodes(placed.flags[record]!)).toContain("no-position");
      expect(placed.passOf[record]).toBe(0);
    }
    expect(placed.passes).toHaveLength(1);
    expect(notes).toEqual([
      { code: "no-position", count: 3, firstLine: 12, message: expect.stringContaining("3 of 100 records") },
    ]);
    // The record after a missing place takes the whole distance since the record before in the pass.
    expect(rowDistances(placed)[11 * 4]).toBeCloseTo(1, 3);
  });

  it("mark a jump out and back, not the records after it", () => {
    const log = straight();
    log.latitude[40]! += 0.001;
    const { placed } = place(log);
    const marked = Array.from(placed.flags).flatMap((bits, i) =>
      flagCodes(bits).includes("impossible-step") ? [i] : [],
    );
    expect(marked).toEqual([40]);
    expect(placed.passes).toHaveLength(1);
  });

  it("take a lasting move without times between for a new pass, not for a jump", () => {
    const records = [
      ...straightTrack({ from: [0, 0], headingDeg: 0, records: 40 }),
      ...straightTrack({ from: [300, 0], headingDeg: 0, records: 40, startS: 8 }),
    ];
    const { placed } = place(makeLog({ records, channels: CHANNELS }));
    expect(placed.flags.every((bits) => bits === 0)).toBe(true);
    expect(placed.passes).toHaveLength(2);
  });

  it("mark repeated and backward times", () => {
    const log = straight();
    log.timeMs[20] = log.timeMs[19]!;
    log.timeMs[60] = log.timeMs[50]!;
    const { placed } = place(log);
    expect(flagCodes(placed.flags[20]!)).toEqual(["duplicate-time"]);
    expect(flagCodes(placed.flags[60]!)).toEqual(["time-backwards"]);
  });

  it("mark records that stand still or are lifted, and delete none", () => {
    const records = straightTrack({ from: [0, 0], headingDeg: 0, records: 60 }).map((record, i) => ({
      ...record,
      speedMps: i >= 30 && i < 33 ? 0.1 : 2.5,
      working: i < 50,
    }));
    const { placed } = place(makeLog({ records, channels: CHANNELS }));
    expect(flagCodes(placed.flags[31]!)).toEqual(["standing-still"]);
    expect(flagCodes(placed.flags[55]!)).toEqual(["not-working"]);
    expect(placed.flags).toHaveLength(60);
  });

  it("without a working column a record works where it has a reading", () => {
    const value = (record: number) => (record >= 40 && record < 60 ? NaN : 900);
    const records = straightTrack({ from: [0, 0], headingDeg: 0, records: 100 });
    const { placed } = place(makeLog({ records, channels: [{ id: "downforce", value }] }));
    expect(placed.passes.map((pass) => [pass.first, pass.records])).toEqual([
      [0, 40],
      [60, 40],
    ]);
  });
});
