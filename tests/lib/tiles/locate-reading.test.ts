import { describe, expect, it } from "vitest";
import { buildTileIndex } from "@/lib/tiles/build-tile-index";
import { locateReading } from "@/lib/tiles/locate-reading";
import { cellMiddle, placeStraightPasses, type StraightPasses } from "./place-straight-passes";

const LOG: StraightPasses = {
  centre: [-98.612, 38.417],
  headingDeg: 312,
  passes: 4,
  recordsPerPass: 50,
  stepM: 1.2,
  rows: 24,
  rowSpacingM: 0.25,
};

describe("locateReading", () => {
  it("finds every reading by the middle of its cell", () => {
    const { placed } = placeStraightPasses(LOG);
    const index = buildTileIndex(placed);
    for (let record = 0; record < 200; record += 7) {
      for (const row of [1, 2, 12, 24]) {
        expect(locateReading(index, ...cellMiddle(placed, LOG, record, row))).toEqual({ record, row });
      }
    }
  });

  it("finds it on either side of the antimeridian", () => {
    const options = { ...LOG, centre: [179.9999, 12] as [number, number], headingDeg: 90 };
    const { placed } = placeStraightPasses(options);
    const index = buildTileIndex(placed);
    const [longitude, latitude] = cellMiddle(placed, options, 30, 4);
    expect(longitude).toBeLessThan(0);
    expect(locateReading(index, longitude, latitude)).toEqual({ record: 30, row: 4 });
  });

  it("answers null off the ground worked", () => {
    const index = buildTileIndex(placeStraightPasses(LOG).placed);
    expect(locateReading(index, -98.7, 38.417)).toBeNull();
  });

  it("answers the later reading where two passes overlap", () => {
    const { placed } = placeStraightPasses(LOG);
    for (let record = 0; record < 50; record += 1) {
      placed.originEastM[150 + record] = placed.originEastM[record]!;
      placed.originNorthM[150 + record] = placed.originNorthM[record]!;
    }
    const found = locateReading(buildTileIndex(placed), ...cellMiddle(placed, LOG, 20, 5));
    expect(found).toEqual({ record: 170, row: 5 });
  });
});
