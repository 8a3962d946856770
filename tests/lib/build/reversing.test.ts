import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { FLAGS } from "@/lib/cleaning/flags";
import { turnDegrees } from "@/lib/geo/circular-mean";
import type { Seeder } from "@/lib/machines/machine";
import { rowPosition } from "@/lib/rows/row-position";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { makeLog, makeSeeder, type MadeRecord } from "@/tests/support/make-log";

const CHANNELS = [{ id: "downforce" as const, value: () => 900 }];

/** Steps of 0.5 m a 0.2 s: `[records, course]` one after the other from the origin, lifted where it does not work. */
function drive(
  legs: { records: number; courseDeg: number; working?: boolean; front?: number; still?: boolean }[],
): MadeRecord[] {
  let [east, north, t] = [0, 0, 0];
  return legs.flatMap(({ records, courseDeg, working = true, front, still }) =>
    Array.from({ length: records }, () => {
      const course = (courseDeg * Math.PI) / 180;
      if (!still) [east, north] = [east + 0.5 * Math.sin(course), north + 0.5 * Math.cos(course)];
      t += 0.2;
      const record: MadeRecord = { eastM: east, northM: north, timeS: t, working, speedMps: still ? 0 : 2.5 };
      return front === undefined ? record : { ...record, headingDeg: front };
    }),
  );
}

function build(records: MadeRecord[], machine: Seeder = makeSeeder({ antennaToRowsM: 3 })) {
  const built = buildLog(makeLog({ records, channels: CHANNELS }), machine);
  if (!built.ok) throw new Error(built.error.message);
  return built.value;
}

const isReversing = (flags: Uint32Array, i: number) => (flags[i]! & FLAGS.reversing) !== 0;

/** North 50 m, back 10 m lifted, north again 30 m. */
const BACK_UP = [
  { records: 100, courseDeg: 0 },
  { records: 20, courseDeg: 180, working: false },
  { records: 60, courseDeg: 0 },
];

describe("reversing", () => {
  it.each([
    ["the track alone", BACK_UP],
    ["the machine's logged heading", BACK_UP.map((leg) => ({ ...leg, front: 0 }))],
    ["a logged course that flips with it", BACK_UP.map((leg) => ({ ...leg, front: leg.courseDeg }))],
  ])("is found from %s, and turns no row end for end", (_name, legs) => {
    const { placed, notes } = build(drive(legs));
    const found = Array.from({ length: 180 }, (_, i) => isReversing(placed.flags, i));
    expect(found.slice(0, 99)).not.toContain(true);
    expect(found.slice(101, 119)).not.toContain(false);
    expect(found.slice(122)).not.toContain(true);
    for (let i = 0; i < 180; i++) expect(Math.abs(turnDegrees(placed.headingDeg[i]!, 0))).toBeLessThan(0.01);
    // Row 1 stays left (west) and the rows stay 3 m behind (south of) the antenna.
    const [antennaEast, antennaNorth] = placed.plane.toPlane(placed.log.longitude[110]!, placed.log.latitude[110]!);
    const [east, north] = rowPosition(placed, 110, 1);
    expect(east - antennaEast).toBeCloseTo(-0.375, 3);
    expect(north - antennaNorth).toBeCloseTo(-3, 3);
    expect(notes.map((note) => note.code)).toContain("reversing");
  });

  it("is found behind a stop", () => {
    const [out, back, on] = BACK_UP;
    const still = { records: 30, courseDeg: 0, working: false, still: true };
    const { placed } = build(drive([out!, still, back!, still, on!]));
    expect(isReversing(placed.flags, 140)).toBe(true);
    expect(isReversing(placed.flags, 115)).toBe(false);
    expect(isReversing(placed.flags, 165)).toBe(false);
    for (let i = 0; i < placed.log.records; i++) {
      expect(Math.abs(turnDegrees(placed.headingDeg[i]!, 0))).toBeLessThan(0.01);
    }
  });

  it("is told in a turn of three moves: forwards, back, forwards the other way", () => {
    const curve = (from: number, to: number, records: number, working = false) =>
      Array.from({ length: records }, (_, k) => ({
        records: 1,
        courseDeg: from + ((to - from) * (k + 0.5)) / records,
        working,
      }));
    const legs = [
      { records: 100, courseDeg: 0 },
      ...curve(0, 60, 14),
      ...curve(240, 300, 14),
      ...curve(120, 180, 14),
      { records: 100, courseDeg: 180 },
    ];
    const { placed } = build(drive(legs));
    const flagged = Array.from({ length: 242 }, (_, i) => i).filter((i) => isReversing(placed.flags, i));
    expect(flagged.length).toBeGreaterThan(11);
    expect(flagged.length).toBeLessThan(17);
    expect(Math.min(...flagged)).toBeGreaterThanOrEqual(113);
    expect(placed.headingDeg[50]).toBeCloseTo(0, 3);
    expect(placed.headingDeg[220]).toBeCloseTo(180, 3);
    // Half way back the front points at 90 degrees while the machine moves towards 270.
    expect(Math.abs(turnDegrees(placed.headingDeg[121]!, 90))).toBeLessThan(8);
  });

  it("is never claimed in turns, lifted or not logged", () => {
    for (const logTurns of [true, false]) {
      for (const seed of [1, 2, 3]) {
        const { log, truth } = simulateSeedingLog({
          seed,
          logTurns,
          headland: { rounds: 1, downInCorners: true },
          noise: { downforceN: 12, marginN: 40, depthM: 0.002, headingDeg: 1, positionM: 0.03 },
        });
        for (const headingDeg of [log.headingDeg, null]) {
          const built = buildLog({ ...log, headingDeg }, truth.options.machine);
          if (!built.ok) throw new Error(built.error.message);
          expect(built.value.placed.flags.filter((bits) => (bits & FLAGS.reversing) !== 0)).toHaveLength(0);
        }
      }
    }
  });

  it("is never claimed between passes that lie close together with their turns not logged", () => {
    const passes = [0, 1, 2, 3].flatMap((k) => {
      const records = drive([{ records: 80, courseDeg: k % 2 === 0 ? 0 : 180 }]);
      const shift = k % 2 === 0 ? 0 : 40;
      return records.map((record) => ({
        ...record,
        eastM: record.eastM + k,
        northM: record.northM + shift,
        timeS: record.timeS! + 40 * k,
      }));
    });
    const { placed } = build(passes);
    expect(placed.flags.filter((bits) => (bits & FLAGS.reversing) !== 0)).toHaveLength(0);
    expect(placed.headingDeg[120]).toBeCloseTo(180, 3);
  });

  it("leaves a trailed machine's heading as it was, and unsettled for three lengths after it", () => {
    const machine = makeSeeder({ hitch: "trailed", antennaToHitchM: 1, hitchToRowsM: 5, antennaToRowsM: 6 });
    const { placed } = build(drive(BACK_UP), machine);
    for (let i = 40; i < 180; i++) {
      expect(Math.abs(turnDegrees(placed.headingDeg[i]!, 0))).toBeLessThan(0.1);
      expect(placed.flags[i]! & FLAGS["jack-knife"]).toBe(0);
    }
    const unsettled = (i: number) => (placed.flags[i]! & FLAGS["hitch-unsettled"]) !== 0;
    expect(unsettled(90)).toBe(false);
    expect(unsettled(110)).toBe(true);
    // 15 m of 0.5 m steps after the turn of gear.
    expect(unsettled(120 + 27)).toBe(true);
    expect(unsettled(120 + 33)).toBe(false);
  });
});

describe("standing still", () => {
  it("keeps the heading while positions wander about the place", () => {
    const north = drive([{ records: 60, courseDeg: 0 }]);
    const stood = Array.from({ length: 40 }, (_, k) => ({
      eastM: 0.05 * Math.sin(7 * k),
      northM: 30 + 0.05 * Math.cos(5 * k),
      timeS: 12.2 + 0.2 * k,
      working: true,
      speedMps: 0.05,
    }));
    const { placed } = build([...north, ...stood]);
    for (let i = 60; i < 100; i++) {
      expect(Math.abs(turnDegrees(placed.headingDeg[i]!, 0))).toBeLessThan(0.01);
      expect(placed.flags[i]! & FLAGS["standing-still"]).not.toBe(0);
      expect(isReversing(placed.flags, i)).toBe(false);
    }
  });
});
