import { describe, expect, it } from "vitest";
import { boundaryPath } from "@/components/fields/boundary-sketch";
import { readBoundaryText } from "@/components/fields/read-boundary-text";

const ring = (west: number) => [
  [west, 38.4],
  [west + 0.002, 38.4],
  [west + 0.002, 38.402],
  [west, 38.402],
  [west, 38.4],
];

describe("pasted boundaries", () => {
  it("takes a geometry, a feature or a collection, and joins several polygons", () => {
    const polygon = { type: "Polygon", coordinates: [ring(-98.6)] };
    const one = readBoundaryText(JSON.stringify(polygon));
    const other = { type: "Feature", geometry: { type: "Polygon", coordinates: [ring(-98.5)] }, properties: {} };
    const two = readBoundaryText(
      JSON.stringify({
        type: "FeatureCollection",
        features: [{ type: "Feature", geometry: polygon, properties: {} }, other],
      }),
    );
    if (!one.ok || !two.ok) throw new Error("a good boundary was refused");
    expect(two.value.geometry.type).toBe("MultiPolygon");
    expect(two.value.areaM2 / one.value.areaM2).toBeCloseTo(2, 9);
  });

  it("says what is wrong and what to paste", () => {
    const words = (text: string) => {
      const result = readBoundaryText(text);
      return result.ok ? "" : result.error;
    };
    expect(words("name,area")).toContain("not GeoJSON");
    expect(words('{"type":"Point","coordinates":[0,0]}')).toContain("no polygon");
    expect(words(JSON.stringify({ type: "Polygon", coordinates: [ring(-98.6).slice(0, 4)] }))).toContain("closed");
    expect(words(JSON.stringify({ type: "Polygon", coordinates: [ring(298)] }))).toContain("longitude within 180");
  });

  it("says at once where a boundary crosses itself", () => {
    const [a, b, c, d] = ring(-98.6);
    const bow = readBoundaryText(JSON.stringify({ type: "Polygon", coordinates: [[a, c, b, d, a]] }));
    expect(bow.ok ? "" : bow.error).toMatch(/crosses itself/);
  });

  it("draws the outline true to shape, north up", () => {
    // 0.002 degrees each way: narrower than tall by the cosine of the latitude.
    const path = boundaryPath({ type: "Polygon", coordinates: [ring(-98.6)] });
    const numbers = path.match(/-?\d+\.\d+/g)?.map(Number) ?? [];
    const xs = numbers.filter((_, index) => index % 2 === 0);
    const ys = numbers.filter((_, index) => index % 2 === 1);
    const width = Math.max(...xs) - Math.min(...xs);
    const height = Math.max(...ys) - Math.min(...ys);
    expect(width / height).toBeCloseTo(Math.cos((38.401 * Math.PI) / 180), 3);
    expect(ys[0]).toBe(Math.max(...ys));
  });
});
