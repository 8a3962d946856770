// Hand-worked: records half a metre and a fifth of a second apart, so counts follow from the numbers of each rule.
import { describe, expect, it } from "vitest";
import { straightTrack, type MadeRecord } from "@/tests/support/make-log";
import { makePlaced, maskOf, taken } from "@/tests/lib/cleaning/make-placed";

const ONE = [{ id: "margin" as const, value: (record: number) => 400 + (record % 7) }];
const range = (from: number, end: number) => Array.from({ length: end - from }, (_, k) => from + k);

describe("the ends of a pass", () => {
  const placed = makePlaced({
    records: straightTrack({ from: [0, 0], headingDeg: 0, records: 40 }),
    channels: ONE,
  });

  it("are its first metres: 4.8 m hold the records at 0, 0.5 … 4.5 m", () => {
    expect(taken(maskOf(placed, "start-ramp", { distanceM: 4.8, timeS: 0 }).records)).toEqual(range(0, 10));
  });

  it("or its first seconds: 2.9 s hold the records at 0, 0.2 … 2.8 s", () => {
    expect(taken(maskOf(placed, "start-ramp", { distanceM: 0, timeS: 2.9 }).records)).toEqual(range(0, 15));
  });

  it("are whichever of the two reaches further", () => {
    expect(taken(maskOf(placed, "start-ramp", { distanceM: 4.8, timeS: 2.9 }).records)).toEqual(range(0, 15));
  });

  it("and the same from the end", () => {
    expect(taken(maskOf(placed, "end-ramp", { distanceM: 4.8, timeS: 0 }).records)).toEqual(range(30, 40));
    expect(taken(maskOf(placed, "end-ramp", { distanceM: 0, timeS: 0 }).records)).toEqual([]);
  });

  it("are counted in every pass anew", () => {
    const back = straightTrack({ from: [30, 19.5], headingDeg: 180, records: 40, startS: 60 });
    const two = makePlaced({
      records: [...straightTrack({ from: [0, 0], headingDeg: 0, records: 40 }), ...back],
      channels: ONE,
    });
    expect(two.passes).toHaveLength(2);
    const marks = taken(maskOf(two, "start-ramp", { distanceM: 0.8, timeS: 0 }).records);
    expect(marks).toEqual([0, 1, 40, 41]);
  });
});

describe("records without a place of their own", () => {
  const track = straightTrack({ from: [0, 0], headingDeg: 90, records: 40 });
  const records = track.map((record, i) => (i === 20 ? { ...record, northM: 60 } : { ...record, working: i !== 30 }));
  const placed = makePlaced({ records: records.map((record) => ({ working: true, ...record })), channels: ONE });

  it("are told by why they have none", () => {
    expect(taken(maskOf(placed, "impossible-step").records)).toEqual([20]);
    expect(taken(maskOf(placed, "not-working").records)).toEqual([30]);
    expect(taken(maskOf(placed, "no-position").records)).toEqual([]);
  });

  it("have no position where the file gives none, or 0, 0", () => {
    const made = { records: straightTrack({ from: [0, 0], headingDeg: 90, records: 40 }), channels: ONE };
    const lost = makePlaced(made, (log) => {
      log.longitude[7] = log.latitude[7] = NaN;
      log.longitude[9] = log.latitude[9] = 0;
    });
    expect(taken(maskOf(lost, "no-position").records)).toEqual([7, 9]);
  });

  it("repeat a time, or run back, only where they belong to a pass", () => {
    const repeated = straightTrack({ from: [0, 0], headingDeg: 90, records: 40 }).map((record, i) => ({
      ...record,
      timeS: i === 12 || i === 35 ? 0.2 * (i - 1) : 0.2 * i,
      working: i !== 35,
    }));
    const mask = maskOf(makePlaced({ records: repeated, channels: ONE }), "duplicate-time");
    expect(taken(mask.records)).toEqual([12]);
  });
});

describe("speed", () => {
  const speeds = [2, 2, 2, 0.2, 2, 2, 2, 7, 2, 2, 2.1, 2.35, 2.4, 2.4];
  const records: MadeRecord[] = straightTrack({ from: [0, 0], headingDeg: 0, records: speeds.length }).map(
    (record, i) => ({ ...record, speedMps: speeds[i] }),
  );
  const placed = makePlaced({ records, channels: ONE });

  it("is out below the least and above the greatest", () => {
    const numbers = { minMps: 0.5, maxMps: 6, maxAccelerationMps2: 100 };
    expect(taken(maskOf(placed, "speed", numbers).records)).toEqual([3, 7]);
  });

  it("is out where it changes too fast: 0.25 m/s in 0.2 s is 1.25 m/s2", () => {
    const numbers = { minMps: 0, maxMps: 50, maxAccelerationMps2: 1.2 };
    expect(taken(maskOf(placed, "speed", numbers).records)).toEqual([3, 4, 7, 8, 11]);
  });

  it("keeps records whose speed nobody knows", () => {
    const unknown = { ...placed, speedMps: new Float32Array(records.length).fill(NaN) };
    expect(taken(maskOf(unknown, "speed").records)).toEqual([]);
  });
});

describe("turning", () => {
  /** 40 m north, a quarter circle of 5 m radius (7.854 m) to the east, 40 m east; a record every half metre. */
  const track: MadeRecord[] = range(0, 176).map((i) => {
    const s = i * 0.5;
    const quarter = (5 * Math.PI) / 2;
    if (s <= 40) return { eastM: 0, northM: s, timeS: i * 0.2, headingDeg: 0 };
    const turned = Math.min(s - 40, quarter) / 5;
    const beyond = Math.max(0, s - 40 - quarter);
    const arc = { eastM: 5 - 5 * Math.cos(turned) + beyond, northM: 40 + 5 * Math.sin(turned) };
    return { ...arc, timeS: i * 0.2, headingDeg: (turned * 180) / Math.PI };
  });
  const placed = makePlaced({ records: track, channels: ONE });

  it("takes the records about which 45 degrees are turned within 15 m: 3.573 m before to 3.573 m behind the arc", () => {
    const marks = taken(maskOf(placed, "turning").records);
    // From 36.43 m to 51.43 m; the heading is smoothed over about 2 m, which blurs both ends alike.
    expect(marks[0]! * 0.5).toBeGreaterThan(35.4);
    expect(marks[0]! * 0.5).toBeLessThan(37.4);
    expect(marks.at(-1)! * 0.5).toBeGreaterThan(50.4);
    expect(marks.at(-1)! * 0.5).toBeLessThan(52.4);
    expect(marks).toEqual(range(marks[0]!, marks.at(-1)! + 1));
  });

  it("takes none where more is allowed than was turned", () => {
    expect(taken(maskOf(placed, "turning", { turnDeg: 100 }).records)).toEqual([]);
  });
});

describe("short passes", () => {
  const placed = makePlaced({
    records: [
      ...straightTrack({ from: [0, 0], headingDeg: 0, records: 40 }),
      ...straightTrack({ from: [30, 0], headingDeg: 0, records: 15, startS: 60 }),
    ],
    channels: ONE,
  });

  it("go as a whole: 15 records over 7 m", () => {
    expect(placed.passes.map((pass) => pass.records)).toEqual([40, 15]);
    expect(taken(maskOf(placed, "short-pass", { minLengthM: 10, minRecords: 1 }).records)).toEqual(range(40, 55));
    expect(taken(maskOf(placed, "short-pass", { minLengthM: 5, minRecords: 16 }).records)).toEqual(range(40, 55));
    expect(taken(maskOf(placed, "short-pass", { minLengthM: 5, minRecords: 10 }).records)).toEqual([]);
  });
});
