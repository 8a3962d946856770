import { describe, expect, it } from "vitest";
import { buildTileIndex, tileIndexBounds } from "@/lib/tiles/build-tile-index";
import { drawsSingleCells, rasteriseTile } from "@/lib/tiles/rasterise-tile";
import { pixelAt, tileAt, toWorld } from "@/lib/tiles/tile-address";
import { cellMiddle, placeStraightPasses, type StraightPasses } from "./place-straight-passes";

const NORTHERN: StraightPasses = {
  centre: [-98.612, 38.417],
  headingDeg: 37,
  passes: 3,
  recordsPerPass: 40,
  stepM: 4,
  rows: 6,
  rowSpacingM: 3,
};
const SOUTHERN: StraightPasses = { ...NORTHERN, centre: [147.35, -35.12], headingDeg: 200 };
const DATELINE: StraightPasses = { ...NORTHERN, centre: [179.9999, -17.3], headingDeg: 90 };
const STAGGERED: StraightPasses = { ...NORTHERN, rowForwardM: [0, 1.5, 0, 1.5, 0, 1.5] };

/** The value drawn at a place, on the tile that holds it. */
function valueDrawnAt(options: StraightPasses, z: number, record: number, row: number): number {
  const { placed, channel } = placeStraightPasses(options);
  const [longitude, latitude] = cellMiddle(placed, options, record, row);
  const tile = tileAt(longitude, latitude, z);
  const wrapped = longitude - 360 * Math.round(toWorld(longitude, latitude)[0] - 0.5);
  const [column, line] = pixelAt(wrapped, latitude, tile, 512);
  return rasteriseTile(buildTileIndex(placed), channel, { ...tile, size: 512 })[line * 512 + column]!;
}

describe("close zooms", () => {
  for (const [name, options] of Object.entries({ NORTHERN, SOUTHERN, DATELINE, STAGGERED })) {
    it(`draw each known cell of the ${name.toLowerCase()} log with its own reading`, () => {
      for (const z of [16, 17, 18, 19]) {
        for (const [record, row] of [
          [0, 1],
          [0, 6],
          [5, 1],
          [39, 3],
          [40, 1],
          [41, 6],
          [119, 2],
        ] as const) {
          const pass = Math.floor(record / 40) + 1;
          expect(valueDrawnAt(options, z, record, row), `z${z} record ${record} row ${row}`).toBe(
            1000 * pass + 10 * (record % 40) + row,
          );
        }
      }
    });
  }

  it("never join the end of one pass to the start of the next", () => {
    const { placed, channel } = placeStraightPasses(NORTHERN);
    const index = buildTileIndex(placed);
    // Half-way from the last record of pass 1 to the first of pass 2 lies on ground of passes 1 and 2 near their middles, so
    // look where a joining cell would lie and no cell may: beyond the end of pass 1.
    const [longitude, latitude] = placed.plane.toDegrees(placed.originEastM[39]! + 5, placed.originNorthM[39]! + 5);
    const tile = tileAt(longitude, latitude, 18);
    const [column, line] = pixelAt(longitude, latitude, tile, 512);
    expect(rasteriseTile(index, channel, { ...tile, size: 512 })[line * 512 + column]).toBeNaN();
    expect(index.previousFrame[40]).toBe(120 + 1);
  });

  it("cover as many pixels as the ground worked has area", () => {
    const { placed, channel } = placeStraightPasses(NORTHERN);
    const index = buildTileIndex(placed);
    const [longitude, latitude] = placed.plane.toDegrees(placed.originEastM[60]!, placed.originNorthM[60]!);
    const middle = tileAt(longitude, latitude, 16);
    let covered = 0;
    for (const x of [middle.x - 1, middle.x, middle.x + 1]) {
      for (const y of [middle.y - 1, middle.y, middle.y + 1]) {
        covered += rasteriseTile(index, channel, { z: 16, x, y, size: 512 }).filter(
          (value) => !Number.isNaN(value),
        ).length;
      }
    }
    const pixelsPerM = index.worldPerM * 2 ** 16 * 512;
    // 3 passes of 40 cells of 4 m, 18 m wide; hand-worked.
    expect(covered / (3 * 40 * 4 * 18 * pixelsPerM ** 2)).toBeCloseTo(1, 2);
  });

  it("leave missing readings empty", () => {
    const options = {
      ...NORTHERN,
      value: (_: number, record: number, row: number) => (record === 5 && row === 2 ? NaN : 9),
    };
    expect(valueDrawnAt(options, 18, 5, 2)).toBeNaN();
    expect(valueDrawnAt(options, 18, 5, 3)).toBe(9);
  });

  it("spread a channel with one value a record over all rows", () => {
    const { placed } = placeStraightPasses(NORTHERN);
    const values = Float32Array.from({ length: placed.log.records }, (_, record) => record);
    const [longitude, latitude] = cellMiddle(placed, NORTHERN, 17, 6);
    const tile = tileAt(longitude, latitude, 18);
    const [column, line] = pixelAt(longitude, latitude, tile, 512);
    const pixels = rasteriseTile(buildTileIndex(placed), { rows: 1, perRow: false, values }, { ...tile, size: 512 });
    expect(pixels[line * 512 + column]).toBe(17);
  });
});

describe("seams", () => {
  for (const z of [13, 15, 18]) {
    it(`agree to the bit at z${z}: four tiles are the quarters of one drawn in a piece`, () => {
      const { placed, channel } = placeStraightPasses(NORTHERN);
      const index = buildTileIndex(placed);
      const parent = tileAt(NORTHERN.centre[0], NORTHERN.centre[1], z - 1);
      // The same whole-zoom pixels, drawn as one 1,024 px tile a zoom lower.
      const whole = rasteriseTile(index, channel, { ...parent, size: 1024 });
      for (const [dx, dy] of [
        [0, 0],
        [1, 0],
        [0, 1],
        [1, 1],
      ] as const) {
        const quarter = rasteriseTile(index, channel, { z, x: parent.x * 2 + dx, y: parent.y * 2 + dy, size: 512 });
        const same = quarter.every((value, i) =>
          Object.is(value, whole[(dy * 512 + Math.floor(i / 512)) * 1024 + dx * 512 + (i % 512)]),
        );
        expect(same).toBe(true);
      }
    });
  }
});

describe("far zooms", () => {
  const FINE: StraightPasses = {
    ...NORTHERN,
    rows: 24,
    rowSpacingM: 0.25,
    stepM: 1.2,
    recordsPerPass: 200,
    headingDeg: 90,
  };

  it("say so", () => {
    const index = buildTileIndex(placeStraightPasses(FINE).placed);
    expect(drawsSingleCells(index, 13, 512)).toBe(false);
    expect(drawsSingleCells(index, 19, 512)).toBe(true);
  });

  it("show in a pixel the distance-weighted mean of what it covers", () => {
    const options = {
      ...FINE,
      value: (pass: number, record: number, row: number) => pass * 100 + (record % 7) * 10 + row,
    };
    const { placed, channel } = placeStraightPasses(options);
    // One row's records unevenly far apart: weights that differ.
    for (let pass = 0; pass < 3; pass += 1) {
      for (let step = 0; step < 200; step += 1) {
        placed.originEastM[pass * 200 + step] = step * 1.2 + 0.5 * Math.sin(step);
      }
    }
    const index = buildTileIndex(placed);
    const [longitude, latitude] = placed.plane.toDegrees(120, -6);
    const tile = tileAt(longitude, latitude, 13);
    const pixels = rasteriseTile(index, channel, { ...tile, size: 512 });
    const checked = comparePixels({ placed, channel, tile, pixels });
    expect(checked.pixels).toBeGreaterThan(20);
    expect(checked.worst).toBeLessThan(0.001);
  });

  it("never show a mean of codes: a pixel carries the least code of what it covers", () => {
    const value = (_pass: number, record: number, row: number) => ((record + row) % 2 === 0 ? 5 : 11);
    const { placed, channel } = placeStraightPasses({ ...FINE, value });
    const index = buildTileIndex(placed);
    const [longitude, latitude] = placed.plane.toDegrees(120, -6);
    const tile = tileAt(longitude, latitude, 13);
    const drawn = (isCode: boolean) =>
      new Set(rasteriseTile(index, { ...channel, isCode }, { ...tile, size: 512 }).filter((pixel) => pixel === pixel));
    expect([...drawn(true)]).toEqual([5]);
    // What would be shown if the codes were amounts: rules that took nothing out.
    expect([...drawn(false)].some((mean) => mean > 5 && mean < 11)).toBe(true);
  });

  it("leave no hole inside the ground worked", () => {
    for (const headingDeg of [0, 17, 45, 71]) {
      const { placed, channel } = placeStraightPasses({ ...FINE, headingDeg, passes: 12 });
      const index = buildTileIndex(placed);
      for (const z of [14, 15, 16, 17]) {
        const [longitude, latitude] = placed.plane.toDegrees(
          (placed.originEastM[0]! + placed.originEastM.at(-1)!) / 2,
          (placed.originNorthM[0]! + placed.originNorthM.at(-1)!) / 2,
        );
        const tile = tileAt(longitude, latitude, z);
        const [column, line] = pixelAt(longitude, latitude, tile, 512);
        const pixels = rasteriseTile(index, channel, { ...tile, size: 512 });
        const reach = Math.floor(20 * index.worldPerM * 2 ** z * 512);
        for (let dy = -reach; dy <= reach; dy += 1) {
          for (let dx = -reach; dx <= reach; dx += 1) {
            const [x, y] = [column + dx, line + dy];
            if (x < 0 || y < 0 || x > 511 || y > 511) continue;
            expect(Number.isNaN(pixels[y * 512 + x]!), `heading ${headingDeg} z${z} pixel ${x},${y}`).toBe(false);
          }
        }
      }
    }
  });
});

/** An independent mean, in degrees: every reading counts for the pixel its cell's middle lies in, with the distance it stands for. */
function comparePixels(input: {
  placed: ReturnType<typeof placeStraightPasses>["placed"];
  channel: ReturnType<typeof placeStraightPasses>["channel"];
  tile: ReturnType<typeof tileAt>;
  pixels: Float32Array;
}): { pixels: number; worst: number } {
  const { placed, channel, tile, pixels } = input;
  const weights = new Map<number, number>();
  const sums = new Map<number, number>();
  for (let record = 0; record < placed.log.records; record += 1) {
    if (record % 200 === 0) continue;
    const stepM = placed.originEastM[record]! - placed.originEastM[record - 1]!;
    for (let row = 0; row < 24; row += 1) {
      const east = placed.originEastM[record - 1]! + stepM / 2;
      const north = placed.originNorthM[record]! - placed.geometry.offsetM[row]!;
      const [longitude, latitude] = placed.plane.toDegrees(east, north);
      const [column, line] = pixelAt(longitude, latitude, tile, 512);
      if (column < 0 || line < 0 || column > 511 || line > 511) continue;
      const key = line * 512 + column;
      weights.set(key, (weights.get(key) ?? 0) + stepM);
      sums.set(key, (sums.get(key) ?? 0) + stepM * channel.values[record * 24 + row]!);
    }
  }
  let worst = 0;
  let count = 0;
  const most = Math.max(...weights.values());
  for (const [key, weight] of weights) {
    // Pixels at the rim hold few readings: one row more or less moves their mean.
    if (weight < 0.7 * most) continue;
    count += 1;
    worst = Math.max(worst, Math.abs(pixels[key]! - sums.get(key)! / weight));
  }
  return { pixels: count, worst };
}

describe("bounds", () => {
  it("hold the ground worked, and run west > east across the antimeridian", () => {
    const [west, south, east, north] = tileIndexBounds(buildTileIndex(placeStraightPasses(NORTHERN).placed))!;
    expect(west).toBeLessThan(-98.612);
    expect(east).toBeGreaterThan(-98.612);
    expect(south).toBeLessThan(north);
    const dateline = tileIndexBounds(buildTileIndex(placeStraightPasses(DATELINE).placed))!;
    expect(dateline[0]).toBeGreaterThan(dateline[2]);
  });

  it("are null for a log without a cell", () => {
    const { placed } = placeStraightPasses({ ...NORTHERN, recordsPerPass: 1 });
    expect(tileIndexBounds(buildTileIndex(placed))).toBeNull();
  });
});
