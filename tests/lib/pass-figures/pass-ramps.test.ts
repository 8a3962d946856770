import { describe, expect, it } from "vitest";
import { passRamps } from "@/lib/pass-figures/pass-ramps";
import { backAndForth, onGround } from "./made-log";

/** 0.45 m a record, so that none stands where one metre ends: 267 records are 119.7 m, and the reach is 30 m. */
const STEP_M = 0.45;
const RECORDS = 267;
const passesOf = (passes: number) => backAndForth(passes, RECORDS, STEP_M);

/** 400 N in the middle of the first pass and 10 N more in each later one; 8 N less a metre over the first five metres. */
function ramped(record: number): number {
  const alongM = (record % RECORDS) * STEP_M;
  const pass = Math.floor(record / RECORDS);
  return 400 + 10 * pass - Math.max(0, 5 - alongM) * 8;
}

describe("starts of passes", () => {
  const body = passRamps(onGround({ records: passesOf(10), channels: [{ id: "margin", value: ramped }] }, "margin"));

  it("are laid on each other at 0 m and held against the middle of the same pass (hand-worked)", () => {
    expect(body).toMatchObject({ reachM: 30, passes: 10, tooShort: 0, reason: null });
    expect(body.middleMean).toBeCloseTo(445, 1);
    // Metre 0 holds the readings at 0, 0.45 and 0.9 m: 40, 36.4 and 32.8 N below; metre 4 those at 4.05, 4.5 and 4.95 m.
    expect(body.start.metres[0]!.difference).toBeCloseTo(-36.4, 2);
    expect(body.start.metres[4]!.difference).toBeCloseTo(-(7.6 + 4 + 0.4) / 3, 2);
    expect(body.start.metres[0]!.mean).toBeCloseTo(445 - 36.4, 1);
    expect(body.start.metres[10]!.difference).toBeCloseTo(0, 3);
    expect(body.start.metres[0]!.speedMps).toBeCloseTo(0.45 / 0.2, 1);
  });

  it("have intervals that leave out what differs between passes", () => {
    const [low, high] = body.start.metres[0]!.interval!;
    // Every pass has the very same ramp: its interval is a point, whatever the passes' own levels.
    expect(high - low).toBeLessThan(0.2);
    expect(high).toBeLessThan(0);
  });

  it("leave the ends alone where nothing happens there", () => {
    expect(body.end.metres).toHaveLength(30);
    for (const metre of body.end.metres) expect(Math.abs(metre.difference!)).toBeLessThan(1e-3);
  });
});

describe("where a ramp is over", () => {
  it("is the first of three metres whose intervals hold 0", () => {
    // A wobble of its own in every pass, so that intervals are wide enough to hold 0 once the ramp is over.
    const wobble = (record: number) => 12 * Math.sin(record * 1.7 + Math.floor(record / RECORDS) * 2.1);
    const channels = [{ id: "margin" as const, value: (record: number) => ramped(record) + wobble(record) }];
    const { start } = passRamps(onGround({ records: passesOf(12), channels }, "margin"));
    expect(start.settledAtM).toBeGreaterThanOrEqual(3);
    expect(start.settledAtM).toBeLessThanOrEqual(7);
  });
});

describe("what cannot be shown", () => {
  it("are intervals of fewer than eight passes", () => {
    const channels = [{ id: "margin" as const, value: ramped }];
    const body = passRamps(onGround({ records: passesOf(5), channels }, "margin"));
    expect(body.start.metres[0]!.interval).toBeNull();
    expect(body.start.settledAtM).toBeNull();
    expect(body.reason).toBe("An interval needs 8 passes of at least 90 m; this log has 5.");
  });

  it("is the middle of passes that are all start and end", () => {
    const channels = [{ id: "margin" as const, value: () => 400 }];
    const body = passRamps(onGround({ records: backAndForth(9, 12), channels }, "margin"));
    expect(body).toMatchObject({ reachM: 0, passes: 0, tooShort: 9, middleMean: null });
    expect(body.reason).toBe("Passes are shorter than 9 m: they are all start and end.");
  });

  it("is shown less far where passes are short", () => {
    const channels = [{ id: "margin" as const, value: () => 400 }];
    const body = passRamps(onGround({ records: backAndForth(9, 101), channels }, "margin"));
    expect(body.reachM).toBe(16);
    expect(body.start.metres).toHaveLength(16);
  });
});
