import { describe, expect, it } from "vitest";
import { CLEANING_CODES, ruleFacts, ruleNumber } from "@/lib/cleaning/rule-catalogue";
import { paintReasons, readReasons, reasonSwatch } from "@/lib/map-state/reason-patterns";
import { encodeValueTile } from "@/lib/tiles/encode-value-tile";
import { scaleBetween } from "@/lib/tiles/value-scale";

const switchable = CLEANING_CODES.filter((code) => ruleFacts(code).fixed === null);

/** Which pixels of a picture carry a stroke, as text. */
function strokesOf({ data, width }: { data: Uint8ClampedArray; width: number }): string {
  const dark = Array.from({ length: data.length / 4 }, (_, pixel) => (data[pixel * 4]! < 128 ? "#" : "."));
  return dark.map((sign, pixel) => (pixel % width === width - 1 ? `${sign}\n` : sign)).join("");
}

describe("the pattern of a reason", () => {
  it("is a shape of its own for every rule that can be switched", () => {
    const shapes = switchable.map((code) => strokesOf(reasonSwatch(code, 16, 16)));
    expect(new Set(shapes).size).toBe(switchable.length);
    expect(shapes.every((shape) => shape.includes("#"))).toBe(true);
  });

  it("has no seam where one tile of 512 ends and the next begins", () => {
    for (const code of switchable) {
      const { data } = reasonSwatch(code, 512, 16);
      const column = (x: number) => Array.from({ length: 16 }, (_, y) => data[(y * 512 + x) * 4]);
      const next = reasonSwatch(code, 16, 16).data;
      // What stands in column 512 of an endless picture is what the next tile begins with.
      expect(column(512 - 8)).toEqual(Array.from({ length: 16 }, (_, y) => next[y * 16 * 4]));
    }
  });

  it("leaves pixels without a reason transparent", () => {
    const { data } = paintReasons([0, ruleNumber("local-outlier"), 0, 99], 2);
    expect([data[3], data[7], data[11], data[15]]).toEqual([0, 255, 0, 0]);
  });

  it("is read back from a tile as the number that was put in", () => {
    const numbers = Float32Array.from([NaN, 2, 5, 6, 13, NaN]);
    const scale = scaleBetween(2, 13, 1);
    const rgb = encodeValueTile(numbers, scale);
    const rgba = Array.from({ length: numbers.length }, (_, pixel) => [...rgb.subarray(pixel * 3, pixel * 3 + 3), 255]);
    expect([...readReasons(rgba.flat(), scale)]).toEqual([0, 2, 5, 6, 13, 0]);
  });
});
