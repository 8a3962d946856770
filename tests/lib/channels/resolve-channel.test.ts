import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { openerResistanceN } from "@/lib/channels/opener-resistance";
import { resolveChannel, resolveChannelOrReason } from "@/lib/channels/resolve-channel";
import { rowSpeedMps } from "@/lib/channels/row-speed";
import type { Seeder } from "@/lib/machines/machine";
import { makeLog, makeSeeder, straightTrack, type MadeLog } from "@/tests/support/make-log";

function place(made: MadeLog, machine: Seeder | null) {
  const built = buildLog(makeLog(made), machine);
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

const records = straightTrack({ from: [0, 0], headingDeg: 0, records: 40 });
/** 800 N of unit weight. */
const MACHINE = makeSeeder({ rowUnitMassKg: 800 / 9.80665 });

describe("opener resistance", () => {
  it("is force plus weight less margin (hand-worked free body: 900 + 800 - 450 = 1250)", () => {
    expect(openerResistanceN(900, 800, 450)).toBe(1250);
    expect(openerResistanceN(900, 800, 0)).toBeNull();
  });

  it("is left out, and counted, where the wheel is off the ground", () => {
    const margin = (_: number, row: number) => (row === 4 ? 0 : row === 3 ? NaN : 450);
    const channels: MadeLog["channels"] = [
      { id: "downforce", value: () => 900, resolution: 1 },
      { id: "margin", value: margin, resolution: 5 },
    ];
    const resistance = resolveChannel(place({ records, channels }, MACHINE), "resistance");
    expect(Array.from(resistance!.values.slice(40, 44))).toEqual([1250, 1250, NaN, NaN]);
    expect(resistance!.censoredShare).toBeCloseTo(1 / 3, 9);
    expect(resistance!.resolution).toBe(1);
  });

  it("says what is missing", () => {
    const only = place({ records, channels: [{ id: "margin", value: () => 450 }] }, null);
    const reason = resolveChannelOrReason(only, "resistance");
    expect(reason.ok ? "" : reason.error).toMatch(/force applied to each row.*machine/);
  });

  it("takes no pressure for a force", () => {
    const channels: MadeLog["channels"] = [
      { id: "downforce", unit: "Pa", value: () => 900 },
      { id: "margin", value: () => 450 },
    ];
    expect(resolveChannel(place({ records, channels }, MACHINE), "resistance")).toBeNull();
  });
});

describe("row speed", () => {
  it("is v less omega y (hand-worked: 2.5 m/s on 20 m, rows 9.144 m out)", () => {
    expect(rowSpeedMps(2.5, 2.5 / 20, -9.144)).toBeCloseTo(3.643, 3);
    expect(rowSpeedMps(2.5, 2.5 / 20, 9.144)).toBeCloseTo(1.357, 3);
  });

  it("comes out of a log driven on a circle", () => {
    const circle = Array.from({ length: 60 }, (_, i) => {
      const angle = (2.5 * 0.2 * i) / 20;
      return { eastM: 20 * (1 - Math.cos(angle)), northM: 20 * Math.sin(angle), timeS: 0.2 * i, speedMps: 2.5 };
    });
    const machine = makeSeeder({ rowCount: 2, rowOffsetsM: [-9.144, 9.144] });
    const placed = place({ records: circle, rows: 2, channels: [{ id: "downforce", value: () => 900 }] }, machine);
    const speed = resolveChannel(placed, "rowSpeed")!;
    expect(speed.values[60]).toBeCloseTo(3.643, 2);
    expect(speed.values[61]).toBeCloseTo(1.357, 2);
  });

  it("is the machine's own on a straight line, whatever small wander the heading has", () => {
    const wander = records.map((record, i) => ({ ...record, headingDeg: i % 2 === 0 ? 0.04 : -0.04, speedMps: 2.5 }));
    const placed = place({ records: wander, channels: [{ id: "downforce", value: () => 900 }] }, MACHINE);
    expect(Array.from(resolveChannel(placed, "rowSpeed")!.values.slice(80, 84))).toEqual([2.5, 2.5, 2.5, 2.5]);
  });
});

describe("other channels", () => {
  const placed = place({ records, channels: [{ id: "downforce", value: (_, row) => 100 * row }] }, MACHINE);

  it("deviation is the reading less the median of the other rows (hand-worked)", () => {
    // Rows 100 200 300 400: the others of row 1 have median 300.
    expect(Array.from(resolveChannel(placed, "deviation:downforce")!.values.slice(0, 4))).toEqual([
      -200, -100, 100, 200,
    ]);
  });

  it("gives null for a channel the log has not, and for a name that is none", () => {
    expect(resolveChannel(placed, "margin")).toBeNull();
    expect(resolveChannel(placed, "deviation:margin")).toBeNull();
    expect(resolveChannel(placed, "no such channel")).toBeNull();
  });
});
