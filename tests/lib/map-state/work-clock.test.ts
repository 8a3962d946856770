import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  buildWorkClock,
  momentOf,
  passAtMoment,
  recordAtMoment,
  shareWorked,
  workedUntil,
} from "@/lib/map-state/work-clock";
import type { PassBody } from "@/lib/schemas/logs";

const BEGAN = "2031-09-24T14:05:00.000Z";
const at = (seconds: number) => new Date(Date.parse(BEGAN) + seconds * 1000).toISOString();

function makePass(pass: number, startS: number | null, endS: number | null): PassBody {
  const instant = (seconds: number | null) => (seconds === null ? null : at(seconds));
  const rest = { headingDeg: 20, lengthM: 300, records: 100, headland: false };
  return { pass, startedAt: instant(startS), endedAt: instant(endS), ...rest };
}

/** Two passes of 100 s and one of 50 s, with a turn of 20 s and a break of an hour between. */
const PASSES = [makePass(1, 0, 100), makePass(2, 120, 220), makePass(3, 3820, 3870)];
const clock = buildWorkClock(PASSES, BEGAN)!;

describe("the time at work", () => {
  it("is that of the passes, without turns and breaks (hand-worked: 100 + 100 + 50)", () => {
    expect(clock.totalS).toBe(250);
    expect([0, 50, 110, 130, 2000, 3845, 9999].map((timeS) => workedUntil(clock, timeS))).toEqual([
      0, 50, 100, 110, 200, 225, 250,
    ]);
  });

  it("turns into a moment: an hour's break takes none of it", () => {
    expect(momentOf(clock, 110)).toBe(130);
    expect(momentOf(clock, 225)).toBe(3845);
    expect(momentOf(clock, -5)).toBe(0);
    expect(momentOf(clock, 1e6)).toBe(3870);
  });

  it("names the pass under way, or the one before during a turn", () => {
    expect([0, 110, 130, 2000, 3820].map((timeS) => passAtMoment(clock, timeS))).toEqual([1, 1, 2, 2, 3]);
  });

  it("says how much of a pass was worked", () => {
    expect([1, 2, 3].map((pass) => shareWorked(clock, pass, 170))).toEqual([1, 0.5, 0]);
  });

  it("follows the order of driving, not of the list", () => {
    const turned = buildWorkClock([...PASSES].reverse(), BEGAN);
    expect(turned).toEqual(clock);
  });

  it("is not known where the log has no date or its passes no times", () => {
    expect(buildWorkClock(PASSES, null)).toBeNull();
    expect(buildWorkClock([makePass(1, null, null)], BEGAN)).toBeNull();
    expect(buildWorkClock([], BEGAN)).toBeNull();
  });

  it("comes back from every moment at work", () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 250, noNaN: true }), (workedS) => {
        expect(workedUntil(clock, momentOf(clock, workedS))).toBeCloseTo(workedS, 6);
      }),
    );
  });
});

describe("the record of a moment", () => {
  it("is the last one logged by then", () => {
    const times = [10, 11, NaN, 13];
    expect([9.9, 10, 12.5, 13, 99].map((timeS) => recordAtMoment(times, timeS))).toEqual([-1, 0, 2, 3, 3]);
  });
});
