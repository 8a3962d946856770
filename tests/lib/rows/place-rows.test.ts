import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { geodesicDestination, geodesicLine } from "@/lib/geo/geodesic-distance";
import { rowLonLat, rowPosition } from "@/lib/rows/row-position";
import { placeRows } from "@/lib/rows/place-rows";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

function placeOne(headingDeg: number, machine: ReturnType<typeof makeSeeder>) {
  return placeRows(
    {
      eastM: Float64Array.of(0),
      northM: Float64Array.of(0),
      headingDeg: Float32Array.of(headingDeg),
      breaks: Uint8Array.of(1),
    },
    machine,
  );
}

describe("placeRows, rigid", () => {
  // Hand-worked: antenna at the origin, rows 6 m behind, the point 3 m right of the centre line.
  it.each([
    { headingDeg: 90, east: -6, north: -3 },
    { headingDeg: 30, east: -0.402, north: -6.696 },
  ])("heading $headingDeg", ({ headingDeg, east, north }) => {
    const machine = makeSeeder({ antennaToRowsM: 6, rowCount: 1, rowOffsetsM: [3] });
    const line = placeOne(headingDeg, machine);
    const heading = (headingDeg * Math.PI) / 180;
    expect(line.originEastM[0]! + 3 * Math.cos(heading)).toBeCloseTo(east, 3);
    expect(line.originNorthM[0]! - 3 * Math.sin(heading)).toBeCloseTo(north, 3);
  });

  it("puts the centre line left of an antenna that sits right of it (hand-worked)", () => {
    const line = placeOne(0, makeSeeder({ antennaRightM: 0.4 }));
    expect(line.originEastM[0]).toBeCloseTo(-0.4, 9);
    expect(line.originNorthM[0]).toBeCloseTo(0, 9);
  });
});

describe("row positions in degrees", () => {
  // GeographicLib 2.1.2: one geodesic from 41.5 -93.6 of azimuth heading + atan2(right, -back); heading 30, 24 rows at
  // 0.762 m, bar 2.5 m behind.
  const rows: [number, number, number][] = [
    [1, 41.50001995641581, -93.60010586094509],
    [12, 41.49998222132221, -93.60001892248796],
    [13, 41.49997879085588, -93.60001101899687],
    [24, 41.49994105569033, -93.59992408064983],
  ];
  const path = Array.from({ length: 21 }, (_, i) => geodesicDestination([-93.6, 41.5], 30, (i - 10) * 0.5));
  const log = makeLog({
    rows: 24,
    records: path.map(() => ({ eastM: 0, northM: 0, headingDeg: 30, speedMps: 2.5 })),
    channels: [{ id: "downforce", value: () => 900 }],
  });
  path.forEach(([longitude, latitude], i) => {
    log.longitude[i] = longitude;
    log.latitude[i] = latitude;
  });
  const built = buildLog(log, makeSeeder({ rowCount: 24, rowSpacingM: 0.762, antennaToRowsM: 2.5 }));

  it.each(rows)("row %d", (row, latitude, longitude) => {
    if (!built.ok) throw new Error(built.error.message);
    const found = rowLonLat(built.value.placed, 10, row);
    expect(geodesicLine(found, [longitude, latitude]).distanceM).toBeLessThan(0.001);
  });
});

describe("ranks and uneven rows", () => {
  it("stands each row where its own offset and rank put it (hand-worked)", () => {
    const machine = makeSeeder({ rowOffsetsM: [-1, -0.4, 0.3, 1], rowForwardM: [0, 0.6, 0, 0.6], antennaToRowsM: 4 });
    const log = makeLog({
      records: straightTrack({ from: [0, 0], headingDeg: 90, records: 20 }).map((record) => ({
        ...record,
        headingDeg: 90,
      })),
      channels: [{ id: "downforce", value: () => 900 }],
    });
    const built = buildLog(log, machine);
    if (!built.ok) throw new Error(built.error.message);
    const { placed } = built.value;
    const [antennaEast, antennaNorth] = placed.plane.toPlane(log.longitude[10]!, log.latitude[10]!);
    const [east, north] = rowPosition(placed, 10, 2);
    expect(east - antennaEast).toBeCloseTo(-4 + 0.6, 4);
    expect(north - antennaNorth).toBeCloseTo(0.4, 4);
  });
});
