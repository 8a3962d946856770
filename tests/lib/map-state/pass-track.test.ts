import { describe, expect, it } from "vitest";
import { boundsOfPositions, cellRing, locateInPass, stretchRing } from "@/lib/map-state/pass-cells";
import { gridOfPass, paintGrid, turnUpright } from "@/lib/map-state/paint-pass";
import { recordAtDistance, recordSpanM } from "@/lib/map-state/pass-track";
import { buildTileIndex } from "@/lib/tiles/build-tile-index";
import { locateReading } from "@/lib/tiles/locate-reading";
import { cellMiddle, placeStraightPasses, type StraightPasses } from "@/tests/lib/tiles/place-straight-passes";
import { trackOfLog } from "./track-of-log";

const LOG: StraightPasses = {
  centre: [-98.612, 38.417],
  headingDeg: 37,
  passes: 2,
  recordsPerPass: 30,
  stepM: 1.5,
  rows: 6,
  rowSpacingM: 0.5,
  rowForwardM: [0, 0.4, 0, 0.4, 0, 0.4],
};

describe("the track of a pass", () => {
  const { placed, channel } = placeStraightPasses(LOG);
  const track = trackOfLog(placed, channel, 2);

  it("begins where the first cell begins: as far back as the next record lies ahead", () => {
    expect(recordSpanM(track, 0)[1]).toBeCloseTo(1.5, 6);
    expect(track.lengthM).toBeCloseTo(30 * 1.5, 6);
  });

  it("finds the record at a distance, kept within the pass", () => {
    expect(recordAtDistance(track, 0)).toBe(0);
    expect(recordAtDistance(track, 1.4)).toBe(0);
    expect(recordAtDistance(track, 1.6)).toBe(1);
    expect(recordAtDistance(track, 1e9)).toBe(29);
  });

  it("names the same reading under a place as the server's index does", () => {
    const index = buildTileIndex(placed);
    for (let record = 30; record < 60; record += 1) {
      for (let row = 1; row <= 6; row += 1) {
        const place = cellMiddle(placed, LOG, record, row);
        expect(locateInPass(track, ...place)).toEqual({ record: record - 30, row });
        expect(locateReading(index, ...place)).toEqual({ record, row });
      }
    }
    expect(locateInPass(track, -98.7, 38.4)).toBeNull();
  });

  it("draws a cell's ring round its middle and a stretch's ring round all its cells", () => {
    const [longitude, latitude] = cellMiddle(placed, LOG, 40, 3);
    const [west, south, east, north] = boundsOfPositions(cellRing(track, 10, 3));
    expect((west + east) / 2).toBeCloseTo(longitude, 8);
    expect((south + north) / 2).toBeCloseTo(latitude, 8);
    const whole = boundsOfPositions(stretchRing(track, null, 10, 12));
    expect(whole[0]).toBeLessThan(west);
    expect(whole[3]).toBeGreaterThan(north);
  });
});

describe("the picture of a pass", () => {
  it("shows each reading where a column lies inside its cell, and the mean by length over several", () => {
    const { placed, channel } = placeStraightPasses(LOG);
    const track = trackOfLog(placed, channel, 1);
    const fine = gridOfPass(track, 90);
    expect(fine[2]![0]).toBe(1003);
    expect(fine[2]![89]).toBe(1293);
    const coarse = gridOfPass(track, 15);
    // Records 0 and 1 of row 1: 1001 and 1011 (hand-worked mean).
    expect(coarse[0]![0]).toBeCloseTo(1006, 3);
  });

  it("leaves missing readings transparent and turns upright without mixing rows and records", () => {
    const grid = [
      [1, NaN, 5],
      [9, 5, 1],
    ];
    const picture = paintGrid(grid, [4], ["#000000", "#ff0000"]);
    const alpha = (x: number, y: number) => picture.data[(y * 3 + x) * 4 + 3];
    expect([alpha(0, 0), alpha(1, 0)]).toEqual([255, 0]);
    const upright = turnUpright(picture);
    expect([upright.width, upright.height]).toEqual([2, 3]);
    // Row 2, first column: value 9, the upper class.
    expect([...upright.data.subarray(4, 8)]).toEqual([255, 0, 0, 255]);
  });
});
