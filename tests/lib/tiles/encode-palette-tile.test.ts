import { describe, expect, it } from "vitest";
import { classColours } from "@/lib/legend/ramps";
import { encodePaletteTile } from "@/lib/tiles/encode-palette-tile";

describe("encodePaletteTile", () => {
  it("paints each value in its class's colour, an edge in the class above, nothing where nothing was logged", () => {
    const bytes = encodePaletteTile(Float32Array.of(NaN, 179, 180, 5000), [180, 490, 890], "cividis");
    const colours = classColours("cividis", 4);
    const hex = (pixel: number) =>
      `#${[...bytes.subarray(pixel * 4, pixel * 4 + 3)].map((b) => b.toString(16).padStart(2, "0")).join("")}`;
    expect(bytes[3]).toBe(0);
    expect([hex(1), hex(2), hex(3)]).toEqual([colours[0], colours[1], colours[3]]);
    expect([bytes[7], bytes[11], bytes[15]]).toEqual([255, 255, 255]);
  });
});
