import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { FLAGS } from "@/lib/cleaning/flags";
import { turnDegrees } from "@/lib/geo/circular-mean";
import { relaxHitchAngleDeg, trailHitch } from "@/lib/rows/trail-hitch";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

describe("relaxHitchAngleDeg", () => {
  it("brings 20 degrees to 7.423 over one drawbar length (hand-worked tractrix)", () => {
    expect(relaxHitchAngleDeg(20, 6, 6)).toBeCloseTo(7.423, 3);
  });
});

describe("trailHitch", () => {
  it("settles at asin(L / R) on a circle, the wheels on a radius of sqrt(R2 - L2) (hand-worked)", () => {
    const [radiusM, lengthM, stepM] = [15, 6, 0.02];
    const records = 8000;
    const angle = (i: number) => (i * stepM) / radiusM;
    const path = {
      eastM: Array.from({ length: records }, (_, i) => radiusM * (1 - Math.cos(angle(i)))),
      northM: Array.from({ length: records }, (_, i) => radiusM * Math.sin(angle(i))),
      headingDeg: Array.from({ length: records }, (_, i) => (angle(i) * 180) / Math.PI),
      breaks: Array.from({ length: records }, (_, i) => (i === 0 ? 1 : 0)),
    };
    const { headingDeg } = trailHitch(path, lengthM);
    const last = records - 1;
    expect(turnDegrees(headingDeg[last]!, path.headingDeg[last]!)).toBeCloseTo(23.578, 1);
    const theta = (headingDeg[last]! * Math.PI) / 180;
    const wheelEast = path.eastM[last]! - lengthM * Math.sin(theta);
    const wheelNorth = path.northM[last]! - lengthM * Math.cos(theta);
    expect(Math.hypot(wheelEast - radiusM, wheelNorth)).toBeCloseTo(13.748, 2);
  });

  it("flags records before three drawbar lengths and a jack-knifed drawbar", () => {
    const out = straightTrack({ from: [0, 0], headingDeg: 0, records: 60 });
    const back = straightTrack({ from: [0.5, 29.4], headingDeg: 178, records: 20 });
    const records = [...out, ...back].map((record, i) => ({ ...record, timeS: i * 0.2 }));
    const path = {
      eastM: records.map((record) => record.eastM),
      northM: records.map((record) => record.northM),
      headingDeg: records.map(() => 0),
      breaks: records.map((_, i) => (i === 0 ? 1 : 0)),
    };
    const { unsettled, jackKnifed } = trailHitch(path, 5);
    expect(unsettled.indexOf(0)).toBe(30);
    expect(jackKnifed.slice(0, 60).includes(1)).toBe(false);
    expect(jackKnifed[62]).toBe(1);
  });
});

describe("a trailed machine in a log", () => {
  it("runs straight behind on a straight line and says which records are unsettled", () => {
    const machine = makeSeeder({ hitch: "trailed", antennaToHitchM: 1.5, hitchToRowsM: 6, antennaToRowsM: 7.5 });
    const records = straightTrack({ from: [0, 0], headingDeg: 45, records: 100 });
    const built = buildLog(makeLog({ records, channels: [{ id: "downforce", value: () => 900 }] }), machine);
    if (!built.ok) throw new Error(built.error.message);
    const { placed, notes } = built.value;
    const [east, north] = placed.plane.toPlane(placed.log.longitude[80]!, placed.log.latitude[80]!);
    expect(placed.originEastM[80]! - east).toBeCloseTo(-7.5 * Math.SQRT1_2, 4);
    expect(placed.originNorthM[80]! - north).toBeCloseTo(-7.5 * Math.SQRT1_2, 4);
    expect(placed.flags[10]! & FLAGS["hitch-unsettled"]).not.toBe(0);
    expect(placed.flags[60]! & FLAGS["hitch-unsettled"]).toBe(0);
    expect(notes.map((note) => note.code)).toContain("hitch-unsettled");
  });
});
