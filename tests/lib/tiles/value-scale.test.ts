import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { encodeValueTile } from "@/lib/tiles/encode-value-tile";
import { codeOf, scaleBetween, valueOfCode, valueScale } from "@/lib/tiles/value-scale";

describe("value scale", () => {
  it("takes the log's own rounding where 65,535 codes reach that far", () => {
    const scale = valueScale({ values: Float32Array.of(0, 250, NaN, 1200), resolution: 5 });
    expect(scale).toMatchObject({ minimum: 0, maximum: 1200, step: 5, offset: -5, redFactor: 1280, greenFactor: 5 });
  });

  it("coarsens where the range needs more codes than there are", () => {
    const scale = valueScale({ values: Float32Array.of(-1000, 1000), resolution: 0.001 });
    expect(scale.step).toBeCloseTo(2000 / 65534, 12);
    expect(codeOf(1000, scale)).toBe(65535);
    expect(codeOf(-1000, scale)).toBe(1);
  });

  it("keeps a constant and an empty channel readable", () => {
    const constant = valueScale({ values: Float32Array.of(7, 7), resolution: null });
    expect(valueOfCode(codeOf(7, constant), constant)).toBe(7);
    const empty = valueScale({ values: Float32Array.of(NaN), resolution: null });
    expect(codeOf(NaN, empty)).toBe(0);
    expect(valueOfCode(0, empty)).toBeNaN();
  });

  it("gives every value back within half a quantum", () => {
    const bound = fc.double({ min: -1e5, max: 1e5, noNaN: true });
    fc.assert(
      fc.property(
        bound,
        bound,
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.constantFrom(null, 0.1, 1, 5),
        (a, b, t, resolution) => {
          const scale = scaleBetween(Math.min(a, b), Math.max(a, b), resolution);
          const value = scale.minimum + t * (scale.maximum - scale.minimum);
          const back = valueOfCode(codeOf(value, scale), scale);
          expect(Math.abs(back - value)).toBeLessThanOrEqual(scale.step / 2 + 1e-9 * Math.max(1, Math.abs(value)));
        },
      ),
      { seed: 7, numRuns: 500 },
    );
  });

  it("writes the code into red and green, and 0, 0, 0 for nothing", () => {
    const scale = scaleBetween(0, 1000, 1);
    const bytes = encodeValueTile(Float32Array.of(NaN, 0, 300), scale);
    // 300 is code 301 = 1 * 256 + 45.
    expect([...bytes]).toEqual([0, 0, 0, 0, 1, 0, 1, 45, 0]);
  });
});
