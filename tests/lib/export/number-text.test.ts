import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { roundTo, shortestFloat32 } from "@/lib/export/number-text";

describe("numbers as they are written", () => {
  it("give every 32-bit number back, fractions in at most nine digits", () => {
    fc.assert(
      fc.property(fc.float({ noNaN: true, noDefaultInfinity: true }), (value) => {
        const short = shortestFloat32(value);
        expect(Math.fround(Number(String(short)))).toBe(value + 0);
        if (Number.isInteger(value)) return;
        expect(short.toExponential().replace(/e.*$/, "").replaceAll(/\D/g, "").length).toBeLessThanOrEqual(9);
      }),
    );
  });

  it("have no more digits than the file they came from", () => {
    fc.assert(
      fc.property(fc.integer({ min: -99_999, max: 99_999 }), (tenths) => {
        expect(shortestFloat32(Math.fround(tenths / 10))).toBe(tenths / 10);
      }),
    );
  });

  it("are rounded without trailing zeros", () => {
    expect(roundTo(-98.612400001, 7)).toBe(-98.6124);
    expect(roundTo(1.25, undefined)).toBe(1.25);
  });
});
