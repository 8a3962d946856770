import sharp from "sharp";
import { describe, expect, it } from "vitest";
import { classColours } from "@/lib/legend/ramps";
import { classOf } from "@/lib/legend/class-edges";
import { parseColour } from "@/lib/legend/parse-colour";
import { drawPaletteTile, drawValueTile, TILE_SIZE } from "@/lib/server/tiles/draw-tile";
import { createSeededRandom } from "@/lib/simulator/seeded-random";
import { buildTileIndex, tileIndexBounds } from "@/lib/tiles/build-tile-index";
import { rasteriseTile } from "@/lib/tiles/rasterise-tile";
import { tileAt } from "@/lib/tiles/tile-address";
import { valueOfCode, valueScale } from "@/lib/tiles/value-scale";
import { placeStraightPasses } from "@/tests/lib/tiles/place-straight-passes";

/** Both ceilings are the product's own. */
const MOST = { palette: 120_000, value: 250_000 };
const random = createSeededRandom(5, "white noise").uniform;

/** Every reading drawn by itself, evenly from 0 to 1500 N in tenths: the worst that a tile can be asked to hold. */
const whiteNoise = placeStraightPasses({
  centre: [-98.612, 38.417],
  headingDeg: 0,
  passes: 40,
  recordsPerPass: 1200,
  stepM: 0.4,
  rows: 48,
  rowSpacingM: 0.25,
  value: () => Math.round(random() * 15_000) / 10,
});
const channel = { ...whiteNoise.channel, resolution: 0.1 };
const index = buildTileIndex(whiteNoise.placed);
const bounds = tileIndexBounds(index)!;
const middle = [(bounds[0] + bounds[2]) / 2, (bounds[1] + bounds[3]) / 2] as const;
const scale = valueScale(channel);

const pixelsAt = (z: number) => rasteriseTile(index, channel, { ...tileAt(...middle, z), size: TILE_SIZE });

/** Edges that put as many pixels in each class: no others make a heavier picture. */
function evenEdges(pixels: Float32Array, classes: number): number[] {
  const sorted = pixels.filter((value) => !Number.isNaN(value)).sort();
  return Array.from({ length: classes - 1 }, (_, i) => sorted[Math.floor(((i + 1) * sorted.length) / classes)]!);
}

describe("tiles of white noise", () => {
  it.each([13, 14, 15, 16, 17, 18, 19])(
    "at zoom %i a palette tile of up to twelve classes is light and exact",
    async (z) => {
      const pixels = pixelsAt(z);
      for (const classes of [7, 12]) {
        const edges = evenEdges(pixels, classes);
        const colours = classColours("viridis", classes);
        const png = drawPaletteTile(pixels, edges, colours);
        expect(png.byteLength).toBeLessThanOrEqual(MOST.palette);
        const rgba = await sharp(png).ensureAlpha().raw().toBuffer();
        const expected = new Uint8Array(rgba.length);
        const bytes = colours.map(parseColour);
        pixels.forEach((value, i) => {
          if (!Number.isNaN(value)) expected.set([...bytes[classOf(value, edges)]!, 255], i * 4);
        });
        expect(Buffer.compare(rgba, expected)).toBe(0);
      }
    },
  );

  it.each([13, 14, 15, 16, 17, 18, 19])("at zoom %i a value tile is light and loses next to nothing", async (z) => {
    const pixels = pixelsAt(z);
    const png = await drawValueTile(pixels, scale);
    expect(png.byteLength).toBeLessThanOrEqual(MOST.value);
    const rgb = await sharp(png).removeAlpha().raw().toBuffer();
    const known = pixels.filter((value) => !Number.isNaN(value));
    const range = known.reduce((a, b) => Math.max(a, b)) - known.reduce((a, b) => Math.min(a, b));
    let worst = 0;
    pixels.forEach((value, i) => {
      const read = valueOfCode(rgb[i * 3]! * 256 + rgb[i * 3 + 1]!, scale);
      if (Number.isNaN(value) !== Number.isNaN(read)) worst = Infinity;
      else if (!Number.isNaN(value)) worst = Math.max(worst, Math.abs(read - value));
    });
    expect(worst).toBeLessThanOrEqual(range / 177 / 2 + scale.step);
  });
});

describe("tiles of readings as they are logged", () => {
  it("a tile that is light enough holds every code", async () => {
    const values = channel.values.map((value) => Math.round(value / 100) * 100);
    const coarse = { ...channel, values, resolution: 100 };
    const steps = valueScale(coarse);
    const pixels = rasteriseTile(index, coarse, { ...tileAt(...middle, 19), size: TILE_SIZE });
    const rgb = await sharp(await drawValueTile(pixels, steps))
      .removeAlpha()
      .raw()
      .toBuffer();
    const read = Float32Array.from(pixels, (_, i) => valueOfCode(rgb[i * 3]! * 256 + rgb[i * 3 + 1]!, steps));
    expect(read).toEqual(pixels);
  });

  it("one class fills a tile of a single bit", async () => {
    const png = drawPaletteTile(new Float32Array(TILE_SIZE ** 2).fill(3), [], ["#123456"]);
    const { data } = await sharp(png).raw().toBuffer({ resolveWithObject: true });
    expect([...data.subarray(0, 3)]).toEqual([0x12, 0x34, 0x56]);
  });
});
