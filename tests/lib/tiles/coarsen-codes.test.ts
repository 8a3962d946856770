import { describe, expect, it } from "vitest";
import { coarsenCodes } from "@/lib/tiles/coarsen-codes";

const noise = Uint16Array.from({ length: 50_000 }, (_, i) => (i % 7 === 0 ? 0 : 1 + ((i * 40_503) % 65_535)));

describe("coarsenCodes", () => {
  it("keeps every code where there are few", () => {
    const { codes, levels, coarseness } = coarsenCodes(Uint16Array.of(0, 7, 300, 7, 299), 180);
    expect(coarseness).toBe(1);
    expect([...levels].map((level) => codes[level])).toEqual([0, 7, 300, 7, 299]);
  });

  it.each([2, 16, 180, 256])("leaves no more than %i levels of noise, none more than half a step off", (most) => {
    const { codes, levels, coarseness } = coarsenCodes(noise, Math.max(4, most));
    expect(codes.length).toBeLessThanOrEqual(Math.max(4, most));
    levels.forEach((level, i) => {
      const [code, was] = [codes[level]!, noise[i]!];
      expect(code === 0).toBe(was === 0);
      // Next to the ends of the scale a code is held within it.
      if (was !== 0) expect(Math.abs(code - was)).toBeLessThanOrEqual(coarseness / 2);
    });
  });

  it("spends its levels on the values there are, not on the gap up to a stray", () => {
    const codes = Uint16Array.from({ length: 1000 }, (_, i) => (i === 500 ? 60_000 : 1000 + (i % 100)));
    expect(coarsenCodes(codes, 180).coarseness).toBe(1);
  });
});
