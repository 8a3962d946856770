import { describe, expect, it } from "vitest";
import { buildGrid } from "@/lib/map-state/build-grid";
import { boundsOfGeometry } from "@/lib/map-state/geometry-bounds";
import { chooseScaleBar } from "@/lib/map-state/scale-bar";

const CLOSE = { widthPx: 1000, anchor: [-98.612, 38.417] as [number, number], unitM: 1, unitSign: "m" };

describe("the grid", () => {
  it("counts in degrees from afar", () => {
    const { labels } = buildGrid({ ...CLOSE, bounds: [-110, 30, -80, 45] });
    const texts = labels.features.map((label) => label.properties.text);
    expect(texts).toContain("100° W");
    expect(texts).toContain("40° N");
  });

  it("becomes a metre grid from the anchor close up", () => {
    // About 0.01 degrees of longitude at 38.4 north: 873 m.
    const { labels, lines } = buildGrid({ ...CLOSE, bounds: [-98.614, 38.415, -98.604, 38.421] });
    const zero = labels.features.find(({ properties }) => properties.text === "0 m" && properties.edge === "bottom");
    expect(zero?.geometry.coordinates[0]).toBeCloseTo(-98.612, 9);
    const next = labels.features.find(({ properties }) => properties.text === "100 m" && properties.edge === "bottom");
    // 100 m east on the WGS 84 ellipsoid at 38.417 north: a degree of longitude is 87 327 m there (published tables, interpolated).
    expect(((next?.geometry.coordinates[0] ?? 0) + 98.612) * 87327).toBeCloseTo(100, 0);
    expect(lines.features.length).toBe(labels.features.length);
  });
});

describe("the scale bar", () => {
  it("is the longest round length that fits", () => {
    expect(chooseScaleBar(0.5, 110, "metric")).toEqual({ widthPx: 100, text: "200\u202fm" });
    expect(chooseScaleBar(0.01, 110, "metric")).toEqual({ widthPx: 100, text: "10\u202fkm" });
    const feet = chooseScaleBar(1, 110, "imperial");
    expect(feet?.text).toBe("200\u202fft");
    expect(feet?.widthPx).toBeCloseTo(60.96, 6);
    expect(chooseScaleBar(0, 110, "metric")).toBeNull();
  });
});

describe("bounds of a place", () => {
  it("hold every kind of geometry, and are null without a position", () => {
    const place = {
      type: "GeometryCollection",
      geometries: [
        { type: "Point", coordinates: [3, 4] },
        {
          type: "LineString",
          coordinates: [
            [1, 2],
            [5, 1],
          ],
        },
      ],
    };
    expect(boundsOfGeometry(place)).toEqual([1, 1, 5, 4]);
    expect(boundsOfGeometry({ type: "FeatureCollection", features: [] })).toBeNull();
    expect(boundsOfGeometry(null)).toBeNull();
  });
});
