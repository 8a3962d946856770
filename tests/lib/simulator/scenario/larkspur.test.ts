import geodesic from "geographiclib-geodesic";
import { describe, expect, it } from "vitest";
import { MachineInput } from "@/lib/machines/machine";
import { LARKSPUR, LARKSPUR_NEXT_DAY } from "@/lib/simulator/scenario/larkspur";
import { writeLarkspurLogs, writeLarkspurNextDay } from "@/lib/simulator/scenario/write-larkspur-logs";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";

const [EAST, MILL] = LARKSPUR.fields;
if (!EAST || !MILL) throw new Error("the scenario has two fields");
const east = simulateSeedingLog(EAST.seeding.input);
const mill = simulateSeedingLog(MILL.seeding.input);
const nextDay = simulateSeedingLog(LARKSPUR_NEXT_DAY.input);

describe("the Larkspur scenario", () => {
  it("has valid machines with names of their own", () => {
    for (const machine of LARKSPUR.machines) expect(MachineInput.parse(machine)).toMatchObject({ name: machine.name });
    expect(new Set(LARKSPUR.machines.map((machine) => machine.name)).size).toBe(3);
  });

  it("drills East quarter across the bands: every row lies in them for 41 % of its way", () => {
    expect(east.log.records).toBeGreaterThan(9_000);
    for (const share of east.truth.inBandShare) expect(Math.abs(share - 2.5 / 6.096)).toBeLessThan(0.02);
  });

  it("drills Mill bottom along the bands: a row lies in them always or never", () => {
    expect(mill.truth.inBandShare.filter((share) => share === 1)).toHaveLength(10);
    expect(mill.truth.inBandShare.filter((share) => share === 0)).toHaveLength(14);
  });

  it("wears out row 17 and lifts the light frame on a small part of the field", () => {
    const margins = east.truth.channels.find((channel) => channel.id === "margin")?.rows ?? [];
    const lowest = margins.reduce((worst, row) => (row.mean < worst.mean ? row : worst));
    expect(lowest.row).toBe(17);
    expect(east.truth.shareLifted).toBeGreaterThan(0.03);
    expect(east.truth.shareLifted).toBeLessThan(0.15);
    expect(nextDay.truth.shareLifted).toBe(0);
  });

  it("leaves the rest of East quarter for the next day without drilling any ground twice", () => {
    const hours = ((nextDay.log.timeMs[0] ?? NaN) - (east.log.timeMs[0] ?? NaN)) / 3_600_000;
    expect(hours).toBeGreaterThan(20);
    expect(hours).toBeLessThan(28);
    const lastEast = across(east);
    const firstNext = across(nextDay);
    // One implement width, less the outermost of some ten thousand positions with 1 cm of noise.
    const spacingM = Math.min(...firstNext) - Math.max(...lastEast);
    expect(spacingM).toBeGreaterThan(5.88);
    expect(spacingM).toBeLessThan(6);
  });

  it("keeps every working record inside the boundary, which is closed and counter-clockwise", () => {
    for (const [field, simulated] of [
      [EAST, east],
      [MILL, mill],
      [EAST, nextDay],
    ] as const) {
      const ring = field.boundary.coordinates[0] ?? [];
      expect(ring.at(-1)).toEqual(ring[0]);
      expect(areaM2(ring)).toBeGreaterThan(0);
      simulated.truth.passOfRecord.forEach((pass, record) => {
        const at = [simulated.log.longitude[record] ?? NaN, simulated.log.latitude[record] ?? NaN] as const;
        if (pass > 0 && !isInside(ring, at)) throw new Error(`record ${record} of ${field.name} lies outside`);
      });
    }
    // Hand-worked: 310 x 240 m.
    expect(areaM2(EAST.boundary.coordinates[0] ?? [])).toBeCloseTo(74_400, -1);
  });

  it("writes each file once, the next day's in pounds-force with one unexplained column", () => {
    const files = [...writeLarkspurLogs()];
    expect(files.map((file) => [file.fieldKey, file.kind])).toEqual([
      ["east-quarter", "harvest"],
      ["east-quarter", "seeding"],
      ["mill-bottom", "harvest"],
      ["mill-bottom", "seeding"],
    ]);
    const names = writeLarkspurNextDay().text.split("\n")[0]?.split(",") ?? [];
    expect(names).toEqual(expect.arrayContaining(["DF_07_lbf", "DP_24_in", "SPD_mph", "AUX_3"]));
    expect(LARKSPUR.machines.map((machine) => machine.name)).toEqual(
      expect.arrayContaining(files.map((file) => file.machineName)),
    );
  });
});

/** Distance right of a line through the first record along 20 degrees, of every working record. */
function across({ log, truth }: typeof east): number[] {
  const [longitude, latitude] = [-98.6124, 38.4171];
  return [...truth.passOfRecord.keys()]
    .filter((record) => truth.passOfRecord[record] !== 0)
    .map((record) => {
      const line = geodesic.Geodesic.WGS84.Inverse(
        latitude,
        longitude,
        log.latitude[record] ?? NaN,
        log.longitude[record] ?? NaN,
      );
      return (line.s12 ?? NaN) * Math.sin((((line.azi1 ?? NaN) - 20) * Math.PI) / 180);
    });
}

function areaM2(ring: readonly number[][]): number {
  const polygon = geodesic.Geodesic.WGS84.Polygon(false);
  for (const [longitude, latitude] of ring.slice(0, -1)) polygon.AddPoint(latitude ?? NaN, longitude ?? NaN);
  return polygon.Compute(false, true).area ?? NaN;
}

/** Even-odd rule. */
function isInside(ring: readonly number[][], [x, y]: readonly [number, number]): boolean {
  let inside = false;
  ring.forEach(([ax = NaN, ay = NaN], index) => {
    const [bx = NaN, by = NaN] = ring[(index + 1) % ring.length] ?? [];
    if (ay > y !== by > y && x < ax + ((y - ay) / (by - ay)) * (bx - ax)) inside = !inside;
  });
  return inside;
}
