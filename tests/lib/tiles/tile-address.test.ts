import { describe, expect, it } from "vitest";
import { fromWorld, isTileAddress, pixelAt, tileAt, toWorld, worldPerMetre } from "@/lib/tiles/tile-address";

describe("tile addresses", () => {
  it("puts Greenwich on the equator in the middle of the world", () => {
    expect(toWorld(0, 0)).toEqual([0.5, 0.5]);
  });

  it("agrees with the worked example of EPSG Guidance Note 7-2, method 1024", () => {
    // 24 22' 54.433" N, 100 20' 00.000" W -> E -11169055.58 m, N 2800000.00 m (EPSG Guidance Note 7-2, Popular Visualisation Pseudo Mercator).
    const [x, y] = toWorld(-(100 + 20 / 60), 24 + 22 / 60 + 54.433 / 3600);
    const worldM = 2 * Math.PI * 6378137;
    expect((x - 0.5) * worldM).toBeCloseTo(-11169055.58, 1);
    expect((0.5 - y) * worldM).toBeCloseTo(2800000.0, 1);
  });

  it("comes back from world units", () => {
    for (const [longitude, latitude] of [
      [-98.6, 38.4],
      [147.2, -36.1],
      [179.999, -17.5],
    ] as const) {
      const [x, y] = toWorld(longitude, latitude);
      const [backLongitude, backLatitude] = fromWorld(x, y);
      expect(backLongitude).toBeCloseTo(longitude, 10);
      expect(backLatitude).toBeCloseTo(latitude, 10);
    }
  });

  it("names the tile of a place in both hemispheres and wraps columns", () => {
    // Hand-worked: 2 x 2 tiles at zoom 1.
    expect(tileAt(-98.6, 38.4, 1)).toEqual({ z: 1, x: 0, y: 0 });
    expect(tileAt(147.2, -36.1, 1)).toEqual({ z: 1, x: 1, y: 1 });
    expect(tileAt(181, 0.1, 2)).toEqual({ z: 2, x: 0, y: 1 });
  });

  it("finds a place's own pixel inside its tile", () => {
    const tile = tileAt(-98.6, 38.4, 17);
    const [column, row] = pixelAt(-98.6, 38.4, tile, 512);
    expect(column).toBeGreaterThanOrEqual(0);
    expect(column).toBeLessThan(512);
    expect(row).toBeGreaterThanOrEqual(0);
    expect(row).toBeLessThan(512);
  });

  it("refuses addresses outside the world", () => {
    expect(isTileAddress({ z: 2, x: 3, y: 3 })).toBe(true);
    expect(isTileAddress({ z: 2, x: 4, y: 0 })).toBe(false);
    expect(isTileAddress({ z: 2, x: -1, y: 0 })).toBe(false);
    expect(isTileAddress({ z: 1.5, x: 0, y: 0 })).toBe(false);
    expect(isTileAddress({ z: 30, x: 0, y: 0 })).toBe(false);
  });

  it("measures a metre as the ellipsoid has it", () => {
    // A degree of latitude and longitude at 45 degrees on WGS 84: 111 131.8 m and 78 846.8 m (published tables of degree lengths).
    const { east, north } = worldPerMetre(45);
    expect(1 / 360 / east).toBeCloseTo(78846.8, 0);
    const [, y1] = toWorld(0, 44.5);
    const [, y2] = toWorld(0, 45.5);
    expect((y1 - y2) / north / 111131.8).toBeCloseTo(1, 4);
  });
});
