import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { classOf } from "@/lib/legend/class-edges";
import { colourStops } from "@/lib/legend/colour-stops";
import { codeOf, scaleBetween, valueOfCode } from "@/lib/tiles/value-scale";

const COLOURS = ["a", "b", "c", "d"];

/** What a linear interpolation draws at a code: one stop's colour where two neighbours agree or the code is a stop. */
function drawn(stops: [number, string][], code: number): string {
  const exact = stops.find(([at]) => at === code);
  if (exact) return exact[1];
  const after = stops.findIndex(([at]) => at > code);
  const left = stops[after < 0 ? stops.length - 1 : after - 1]!;
  const right = stops[after < 0 ? stops.length - 1 : after]!;
  return left[1] === right[1] ? left[1] : `between ${left[1]} and ${right[1]}`;
}

describe("colourStops", () => {
  it("puts the two ends of each class one code apart and nothing logged at 0", () => {
    const scale = scaleBetween(0, 1000, 1);
    // Hand-worked: value v is code v + 1; edge 180 is code 181.
    expect(colourStops([180, 490, 890], COLOURS, scale)).toEqual([
      [0, "rgba(0, 0, 0, 0)"],
      [1, "a"],
      [180, "a"],
      [181, "b"],
      [490, "b"],
      [491, "c"],
      [890, "c"],
      [891, "d"],
      [65535, "d"],
    ]);
  });

  it("draws every code in the colour of its value's class, whatever the edges and the scale", () => {
    const number = fc.double({ min: -2000, max: 2000, noNaN: true });
    fc.assert(
      fc.property(
        fc.uniqueArray(number, { minLength: 3, maxLength: 3 }),
        number,
        number,
        fc.constantFrom(null, 0.1, 1, 5),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (list, a, b, resolution, t) => {
          const edges = [...list].sort((x, y) => x - y);
          const scale = scaleBetween(Math.min(a, b), Math.max(a, b), resolution);
          const code = codeOf(scale.minimum + t * (scale.maximum - scale.minimum), scale);
          const value = valueOfCode(code, scale);
          // A value within a thousandth of a step of an edge may fall on either side of it.
          fc.pre(edges.every((edge) => Math.abs(edge - value) > 2e-3 * scale.step));
          expect(drawn(colourStops(edges, COLOURS, scale), code)).toBe(COLOURS[classOf(value, edges)]);
        },
      ),
      { seed: 11, numRuns: 1000 },
    );
  });

  it("takes a typed edge for the logged step it names, whatever single precision made of the step", () => {
    // Pounds-force (NIST SP 811) as logged in whole numbers and kept in single precision.
    const pound = 4.4482216152605;
    const scale = scaleBetween(Math.fround(90 * pound), Math.fround(900 * pound), pound);
    for (const edge of [100, 212, 333, 450, 777]) {
      const code = codeOf(Math.fround(edge * pound), scale);
      const stops = colourStops([edge * pound], ["below", "from"], scale);
      expect([drawn(stops, code - 1), drawn(stops, code)]).toEqual(["below", "from"]);
    }
  });

  it("rises strictly, also with edges below, above and between two codes of the scale", () => {
    const scale = scaleBetween(0, 10, 5);
    const stops = colourStops([-100, 6, 7, 1e9], ["a", "b", "c", "d", "e"], scale);
    stops.forEach(([code], i) => {
      if (i > 0) expect(code).toBeGreaterThan(stops[i - 1]![0]);
    });
  });
});
