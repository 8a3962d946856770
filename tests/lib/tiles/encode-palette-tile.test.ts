import { describe, expect, it } from "vitest";
import { encodePaletteTile } from "@/lib/tiles/encode-palette-tile";

describe("encodePaletteTile", () => {
  it("gives each value its class from 1 on, an edge to the class above, 0 where nothing was logged", () => {
    const places = encodePaletteTile(Float32Array.of(NaN, 179, 180, 5000), [180, 490, 890]);
    expect([...places]).toEqual([0, 1, 2, 4]);
  });
});
