import proj4 from "proj4";
import type { MultiPolygon, Polygon, Position } from "geojson";
import { describe, expect, it } from "vitest";
import { boundaryPath } from "@/components/fields/boundary-sketch";
import { buildLog } from "@/lib/build/build-log";
import { coverageAreas } from "@/lib/coverage/coverage-areas";
import { measureCoverage } from "@/lib/coverage/measure-coverage";
import { stretchPlace, wholeRowPlace } from "@/lib/findings/place-lines";
import { cutAtAntimeridian, cutLineAtAntimeridian } from "@/lib/geo/cut-at-antimeridian";
import { distanceToBoundary } from "@/lib/geo/distance-to-boundary";
import { findBoundaryFault } from "@/lib/geo/find-boundary-fault";
import { geodesicAreaM2 } from "@/lib/geo/geodesic-area";
import { createLocalPlane } from "@/lib/geo/local-plane";
import { readLog } from "@/lib/ingest";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { MachineLog } from "@/lib/logs/machine-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { boundsOfGeometry, unwrapBounds } from "@/lib/map-state/geometry-bounds";
import { rowLonLat } from "@/lib/rows/row-position";
import { CoverageAreas } from "@/lib/schemas/coverage";
import { SwathCollectionBody, ZoneCollectionBody } from "@/lib/schemas/log-shapes";
import { fieldBoundary } from "@/lib/simulator/field-ring";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import type { SimulationInput } from "@/lib/simulator/simulation-options";
import { rowStatistics } from "@/lib/statistics/row-statistics";
import { buildTileIndex, tileIndexBounds, tileJsonBounds } from "@/lib/tiles/build-tile-index";
import { locateReading } from "@/lib/tiles/locate-reading";
import { rasteriseTile } from "@/lib/tiles/rasterise-tile";
import { tileAt } from "@/lib/tiles/tile-address";
import { buildSwaths } from "@/lib/zones/swaths";
import { buildZones } from "@/lib/zones/zones";
import { textSource } from "@/tests/lib/ingest/support/make-source";

const REFERENCE: [number, number] = [-98.612, 45];
const PLACES: [name: string, origin: [number, number]][] = [
  ["34 degrees south", [-98.612, -34]],
  ["70 degrees north", [-98.612, 70]],
  ["the equator", [-98.612, 0.0001]],
  ["the prime meridian", [0.0002, 45]],
  ["the antimeridian", [-179.9998, 45]],
  ["the antimeridian at 70 degrees south", [179.9998, -70]],
  ["the edge of two UTM zones", [-96, 45]],
];

const FIELD: SimulationInput = {
  seed: 5,
  headingDeg: 37,
  shape: { kind: "block", passes: 8, passLengthM: 160 },
  headland: { rounds: 1, downInCorners: false },
  passSpacingM: 5.9,
  passWanderM: 0.05,
  wornRow: { row: 6, extraForceN: 200, marginLossN: 140 },
  soil: { gradientEastNPerM: 0.4, gradientNorthNPerM: 0.2, noiseN: 0, noiseRangeM: 25 },
};

function sow(origin: [number, number], change: SimulationInput = {}) {
  const { log, truth } = simulateSeedingLog({ ...FIELD, ...change, origin });
  const boundary = fieldBoundary(truth.options, createLocalPlane(...origin));
  return { log, boundary, machine: truth.options.machine };
}

function place(
  { log, boundary, machine }: ReturnType<typeof sow>,
  field: Polygon | MultiPolygon = boundary,
): PlacedLog {
  const built = buildLog(log, machine, { boundary: field });
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

function marginRows(placed: PlacedLog) {
  return rowStatistics(placed, "margin").items;
}

const reference = sow(REFERENCE);
const known = place(reference);
const knownRows = marginRows(known);
/** Without logged heading and speed the start of a pass lies a little elsewhere. */
const knownBareRows = marginRows(place(withoutMotion(reference)));
const knownCoverage = measureCoverage(known, { boundary: reference.boundary });

function withoutMotion(there: ReturnType<typeof sow>): ReturnType<typeof sow> {
  return { ...there, log: { ...there.log, headingDeg: null, speedMps: null } };
}

function expectSameRows(placed: PlacedLog, rows = knownRows): void {
  for (const [index, row] of marginRows(placed).entries()) {
    const expected = rows[index]!;
    expect(row.n).toBe(expected.n);
    for (const key of ["distanceM", "mean", "sd", "p05", "p50", "p95"] as const) {
      expect(Math.abs(row[key]! / expected[key]! - 1)).toBeLessThan(1e-3);
    }
    expect(row.flagged).toBe(expected.flagged);
  }
}

describe.each(PLACES)("a field at %s", (_name, origin) => {
  const there = sow(origin);
  const placed = place(there);

  it("has the row statistics and passes of the same field at 45 degrees north", () => {
    expectSameRows(placed);
    expect(placed.passes.map((pass) => pass.headland)).toEqual(known.passes.map((pass) => pass.headland));
    expect(new Set(placed.passes.map((pass) => pass.headland)).size).toBe(2);
  });

  it("has them from its track alone, without logged heading and speed", () => {
    expectSameRows(place(withoutMotion(there)), knownBareRows);
  });

  it("has the same ground covered, overlapped and skipped, and the same area", () => {
    const found = measureCoverage(placed, { boundary: there.boundary });
    for (const key of ["sweptM2", "coveredM2"] as const) {
      expect(Math.abs(found[key] / knownCoverage[key] - 1)).toBeLessThan(1e-3);
    }
    expect(Math.abs(found.overlapM2 - knownCoverage.overlapM2)).toBeLessThan(1e-3 * knownCoverage.sweptM2);
    expect(Math.abs(found.skippedM2 - knownCoverage.skippedM2)).toBeLessThan(1e-3 * knownCoverage.sweptM2);
    const areas = [there.boundary, reference.boundary].map((boundary) => geodesicAreaM2(boundary));
    expect(Math.abs(areas[0]! / areas[1]! - 1)).toBeLessThan(1e-3);
  });

  it("has a sound boundary that holds its log", () => {
    expect(findBoundaryFault(there.boundary)).toBeNull();
    const outsideM = distanceToBoundary(there.boundary);
    for (let i = 0; i < there.log.records; i += 50) {
      if (placed.passOf[i]! > 0) expect(outsideM(there.log.longitude[i]!, there.log.latitude[i]!)).toBe(0);
    }
    const narrow = boundsOfGeometry(there.boundary)!;
    expect(narrow[2] - narrow[0]).toBeLessThan(0.01);
    expect(narrow[0]).toBeLessThan(narrow[2]);
    const numbers = boundaryPath(there.boundary)
      .match(/[\d.]+/g)!
      .map(Number);
    expect(Math.min(...numbers)).toBeGreaterThanOrEqual(0);
    expect(Math.max(...numbers)).toBeLessThanOrEqual(100);
    // As wide and high as the box allows: a sketch across 360 degrees would be a hair.
    expect(numbers.filter((number) => number > 20 && number < 80).length).toBeGreaterThan(0);
  });

  it("has zones, swaths and areas that never run round the globe, and add up to the same", () => {
    const zones = ZoneCollectionBody.parse(buildZones(placed, "margin", { breaks: [400, 500] }));
    const swaths = SwathCollectionBody.parse(buildSwaths(placed));
    const areas = CoverageAreas.parse(coverageAreas(placed, there.boundary));
    for (const { geometry } of [...zones.features, ...swaths.features, ...areas.features]) expectLocal(geometry);
    const sum = (placedLog: PlacedLog) =>
      buildZones(placedLog, "margin", { breaks: [400, 500] }).features.reduce(
        (all, zone) => all + geodesicAreaM2(zone.geometry),
        0,
      );
    expect(Math.abs(sum(placed) / sum(known) - 1)).toBeLessThan(1e-3);
    const swept = (placedLog: PlacedLog) =>
      buildSwaths(placedLog).features.reduce((all, swath) => all + swath.properties.areaM2, 0);
    expect(Math.abs(swept(placed) / swept(known) - 1)).toBeLessThan(1e-3);
    const row = wholeRowPlace(placed, 3)!;
    for (const line of row.coordinates as Position[][]) expect(span(line)).toBeLessThan(0.02);
  });

  it("gives back the reading under each place, and tiles that hold it", () => {
    const index = buildTileIndex(placed);
    const channel = placed.log.channels.find(({ id }) => id === "margin")!;
    let compared = 0;
    for (const pass of placed.passes) {
      const record = pass.first + (pass.records >> 1);
      const [a, b] = [rowLonLat(placed, record - 1, 7), rowLonLat(placed, record, 7)];
      const longitude = a[0] + near(b[0] - a[0]) / 2;
      const latitude = (a[1] + b[1]) / 2;
      const found = locateReading(index, longitude, latitude);
      expect(found).toEqual({ record, row: 7 });
      const tile = rasteriseTile(index, channel, { ...tileAt(longitude, latitude, 19), size: 256 });
      expect(tile.some((value) => value === channel.values[record * channel.rows + 6])).toBe(true);
      compared++;
    }
    expect(compared).toBeGreaterThan(10);
    const [west, , east] = tileIndexBounds(index)!;
    expect(unwrapBounds([west, 0, east, 0])[2] - west).toBeLessThan(0.02);
    const told = tileJsonBounds(index);
    expect(told[0]).toBeLessThan(told[2]);
    expect(told[2] - told[0] < 0.02).toBe(west < east);
  });
});

describe("across the antimeridian", () => {
  const there = sow([180, 45], { headingDeg: 0 });
  const whole = place(there);

  it("a boundary cut there (RFC 7946 3.1.9) has no edge along the cut", () => {
    const cut = cutAtAntimeridian(there.boundary.coordinates);
    expect(cut.type).toBe("MultiPolygon");
    expect(geodesicAreaM2(cut) / geodesicAreaM2(there.boundary)).toBeCloseTo(1, 8);
    const placed = place(there, cut);
    expect(placed.passes.map((pass) => pass.headland)).toEqual(whole.passes.map((pass) => pass.headland));
    const [covered, expected] = [cut, there.boundary].map((boundary) => measureCoverage(placed, { boundary }));
    expect(covered!.skippedM2).toBeCloseTo(expected!.skippedM2, 0);
    expect(findBoundaryFault(cut)).toBeNull();
  });

  it("a window with west > east (RFC 7946 5.2) finds what lies on both sides, and no more", () => {
    const all = buildSwaths(whole).features.length;
    expect(buildSwaths(whole, { bbox: [179.99, 44, -179.99, 46] }).features).toHaveLength(all);
    const west = buildSwaths(whole, { bbox: [179.99, 44, 180, 46] }).features.length;
    const east = buildSwaths(whole, { bbox: [-180, 44, -179.99, 46] }).features.length;
    expect(Math.min(west, east)).toBeGreaterThan(0);
    expect(Math.max(west, east)).toBeLessThan(all);
    const zones = buildZones(whole, "margin", { breaks: [450], bbox: [179.99, 44, -179.99, 46] });
    expect(zones.features.length).toBe(buildZones(whole, "margin", { breaks: [450] }).features.length);
  });

  it("a ring is cut into parts on either side, a hole too (hand-worked)", () => {
    const square = (west: number, south: number, east: number, north: number) => [
      [west, south],
      [east, south],
      [east, north],
      [west, north],
      [west, south],
    ];
    const cut = cutAtAntimeridian([square(179, 0, -179, 2)]);
    expect(boundsOfParts(cut)).toEqual([
      [-180, 0, -179, 2],
      [179, 0, 180, 2],
    ]);
    const [outer, hole] = [square(179.96, 0, -179.96, 0.08), square(179.98, 0.02, -179.98, 0.06).toReversed()];
    const holed = cutAtAntimeridian([outer, hole]);
    const whole = geodesicAreaM2({ type: "Polygon", coordinates: [outer, hole] });
    expect(geodesicAreaM2(holed) / whole).toBeCloseTo(1, 6);
    expect(cutAtAntimeridian([square(10, 0, 12, 2)])).toEqual({ type: "Polygon", coordinates: [square(10, 0, 12, 2)] });
  });

  it("a line is cut on it (hand-worked)", () => {
    const line = [
      [179, 0],
      [-179, 2],
      [-178, 2],
    ];
    expect(cutLineAtAntimeridian(line)).toEqual([
      [
        [179, 0],
        [180, 1],
      ],
      [
        [-180, 1],
        [-179, 2],
        [-178, 2],
      ],
    ]);
    const east = sow([180, 45], { headingDeg: 90 });
    const placed = place(east);
    const pass = placed.passes.find((one) => !one.headland)!;
    const found = stretchPlace(placed, 1, { firstRecord: pass.first, lastRecord: pass.first + pass.records - 1 });
    expect(found?.type).toBe("MultiLineString");
    for (const part of found!.coordinates as Position[][]) expect(span(part)).toBeLessThan(0.01);
  });
});

describe("projected positions beyond the edge of their UTM zone", () => {
  it.each(["EPSG:32614", "EPSG:32615"])("in %s give the same rows within a millimetre", async (crs) => {
    const there = sow([-96, 45]);
    const zone = crs.slice(-2);
    const project = proj4(
      "+proj=longlat +datum=WGS84 +no_defs",
      `+proj=utm +zone=${zone} +datum=WGS84 +units=m +no_defs`,
    );
    const read = await readLog(textSource(writeProjected(there.log, project)), mapping(there.log.rows, crs));
    if (!read.ok) throw new Error(read.error.message);
    const placed = place({ ...there, log: read.value.log });
    expectSameRows(placed, knownBareRows);
  });
});

function writeProjected(log: MachineLog, project: proj4.Converter): string {
  const margin = log.channels.find(({ id }) => id === "margin")!;
  const rows = Array.from({ length: log.rows }, (_, row) => `margin ${row + 1}`);
  const lines = Array.from({ length: log.records }, (_, i) => {
    const [east, north] = project.forward([log.longitude[i]!, log.latitude[i]!]) as [number, number];
    const values = margin.values.subarray(i * log.rows, (i + 1) * log.rows);
    const cells = Array.from(values, (value) => (Number.isNaN(value) ? "" : String(value)));
    return [new Date(log.timeMs[i]!).toISOString(), east.toFixed(4), north.toFixed(4), log.working![i], ...cells].join(
      ",",
    );
  });
  return [["time", "east", "north", "down", ...rows].join(","), ...lines].join("\n");
}

function mapping(rows: number, crs: string): LogMapping {
  return {
    shape: "wide",
    crs,
    columns: [
      { name: "time", channel: "time", unit: "iso8601" },
      { name: "east", channel: "easting", unit: "m" },
      { name: "north", channel: "northing", unit: "m" },
      { name: "down", channel: "working", unit: "boolean" },
      ...Array.from({ length: rows }, (_, row) => ({
        name: `margin ${row + 1}`,
        channel: "margin" as const,
        unit: "N" as const,
        row: row + 1,
      })),
    ],
  };
}

const near = (degrees: number) => degrees - 360 * Math.round(degrees / 360);

function span(line: readonly Position[]): number {
  const longitudes = line.map((corner) => corner[0]!);
  return Math.max(...longitudes) - Math.min(...longitudes);
}

function expectLocal(geometry: { type: string; coordinates: unknown }): void {
  const polygons = (geometry.type === "Polygon" ? [geometry.coordinates] : geometry.coordinates) as Position[][][];
  for (const ring of polygons.flat()) {
    expect(span(ring)).toBeLessThan(0.02);
    expect(Math.max(...ring.map((corner) => Math.abs(corner[0]!)))).toBeLessThanOrEqual(180);
  }
}

function boundsOfParts(shape: Polygon | MultiPolygon): number[][] {
  const polygons = shape.type === "Polygon" ? [shape.coordinates] : shape.coordinates;
  return polygons.map((rings) => boundsOfGeometry({ coordinates: rings }) as number[]).sort((a, b) => a[0]! - b[0]!);
}
