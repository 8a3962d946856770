import { describe, expect, it } from "vitest";
import { parseColour } from "@/lib/legend/parse-colour";
import { classColours, isDiverging, RAMP_NAMES, rampOf } from "@/lib/legend/ramps";

/** CIE lightness of an sRGB colour (IEC 61966-2-1 transfer, CIE 1976 L*). */
function lightness(hex: string): number {
  const [r, g, b] = parseColour(hex).map((byte) => {
    const c = byte / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  }) as [number, number, number];
  return 116 * Math.cbrt(0.2126 * r + 0.7152 * g + 0.0722 * b) - 16;
}

describe("ramps", () => {
  it("fit the channels", () => {
    expect(rampOf("downforce")).toBe("cividis");
    expect(rampOf("resistance")).toBe("YlOrBr");
    expect(rampOf("margin")).toBe("PuOr");
    expect(rampOf("deviation:margin")).toBe("BrBG");
    expect(rampOf("other:hopper")).toBe("viridis");
  });

  for (const ramp of RAMP_NAMES) {
    it(`${ramp}: neighbouring classes differ in lightness, so a print in grey still reads`, () => {
      for (const count of [4, 5, 6, 7]) {
        const shades = classColours(ramp, count, (count - 1) >> 1).map(lightness);
        for (let i = 1; i < shades.length; i += 1) {
          expect(Math.abs(shades[i]! - shades[i - 1]!), `${count} classes, ${i}`).toBeGreaterThan(4);
        }
      }
    });
  }

  it("keep the pale middle at the class of the target", () => {
    const colours = classColours("PuOr", 6, 1).map(lightness);
    expect(colours.indexOf(Math.max(...colours))).toBe(1);
    expect(isDiverging("PuOr")).toBe(true);
  });
});
