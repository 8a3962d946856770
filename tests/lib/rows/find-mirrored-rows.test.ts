import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { createLocalPlane } from "@/lib/geo/local-plane";
import type { MachineLog } from "@/lib/logs/machine-log";
import type { Seeder } from "@/lib/machines/machine";
import { findMirroredRows } from "@/lib/rows/find-mirrored-rows";
import { fieldBoundary } from "@/lib/simulator/field-ring";
import { createSeededRandom } from "@/lib/simulator/seeded-random";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import type { SimulationInput } from "@/lib/simulator/simulation-options";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

const ORIGIN: [number, number] = [-98.612, 38.417];
const SEEDS = Array.from({ length: 40 }, (_, k) => k + 1);

/** A field whose two ends lie at an angle (drawn from the seed) to the drilling. */
function angledField(seed: number): SimulationInput {
  const random = createSeededRandom(seed, "field");
  const headingDeg = 360 * random.uniform();
  const slopes = [0, 1].map(() => (random.uniform() < 0.5 ? -1 : 1) * (0.3 + 0.7 * random.uniform()));
  const plane = createLocalPlane(...ORIGIN);
  const corner = (alongM: number, acrossM: number): [number, number] => {
    const heading = (headingDeg * Math.PI) / 180;
    const [sin, cos] = [Math.sin(heading), Math.cos(heading)];
    return plane.toDegrees(alongM * sin + acrossM * cos, alongM * cos - acrossM * sin);
  };
  const half = 36;
  const ring = [
    corner(-100 - half * slopes[0]!, -half),
    corner(100 - half * slopes[1]!, -half),
    corner(100 + half * slopes[1]!, half),
    corner(-100 + half * slopes[0]!, half),
  ];
  return {
    seed,
    origin: ORIGIN,
    headingDeg,
    shape: { kind: "polygon", ring },
    sectionControl: { rowsPerSection: seed % 2 === 0 ? 1 : 3, delayS: (seed % 3) * 0.5 },
    passWanderM: 0.05,
    missingShare: 0.01,
    channels: ["margin"],
    noise: { downforceN: 12, marginN: 40, depthM: 0.002, headingDeg: 0.5, positionM: 0.03 },
  };
}

function mirror(log: MachineLog): MachineLog {
  const channels = log.channels.map((channel) => ({
    ...channel,
    values: channel.values.map((_, at) => {
      const record = Math.floor(at / channel.rows);
      return channel.values[record * channel.rows + channel.rows - 1 - (at % channel.rows)]!;
    }),
  }));
  return { ...log, channels };
}

function place(log: MachineLog, machine: Seeder | null) {
  const built = buildLog(log, machine);
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

/** States over the seeds, with the boundary and without. */
function statesOf(seeds: number[], change: (log: MachineLog) => MachineLog): string[] {
  return seeds.map((seed) => {
    const { log, truth } = simulateSeedingLog(angledField(seed));
    const boundary = fieldBoundary(truth.options, createLocalPlane(...ORIGIN));
    const placed = place(change(log), truth.options.machine);
    return findMirroredRows(placed, seed % 4 < 2 ? boundary : null).state;
  });
}

describe("findMirroredRows", () => {
  it("finds mirrored rows in at least 95 % of 40 angled fields, with boundary and without", () => {
    const states = statesOf(SEEDS, mirror);
    expect(states.filter((state) => state === "mirrored").length).toBeGreaterThanOrEqual(38);
    expect(states).not.toContain("as-logged");
  });

  it("never calls rows mirrored that are not", () => {
    const states = statesOf(SEEDS, (log) => log);
    expect(states.filter((state) => state === "as-logged").length).toBeGreaterThanOrEqual(38);
    expect(states).not.toContain("mirrored");
  });

  it.each(SEEDS.slice(0, 5))("cannot tell on a square field, seed %i", (seed) => {
    const { log, truth } = simulateSeedingLog({ seed, passWanderM: 0.05, missingShare: 0.02 });
    for (const change of [(one: MachineLog) => one, mirror]) {
      const found = findMirroredRows(place(change(log), truth.options.machine), null);
      expect(found).toMatchObject({ state: "cannot-tell", evidence: { runs: 0 } });
    }
  });

  it("cannot tell from four passes", () => {
    const field = angledField(3);
    if (field.shape?.kind !== "polygon") throw new Error("the field is a polygon");
    const { log, truth } = simulateSeedingLog({ ...field, shape: { ...field.shape, lines: { first: 3, last: 4 } } });
    const found = findMirroredRows(place(log, truth.options.machine), null);
    expect(found.state).toBe("cannot-tell");
    expect(found.reason).toMatch(/Only \d ends? of .* 6 are needed/);
  });

  it("reads the edge of ground worked before: a slanted headland pass and inner passes that stop at it", () => {
    // One pass along a line at 45 degrees; seven passes north whose rows stop where they reach its ground, far apart.
    const machine = makeSeeder({ rowCount: 12, rowSpacingM: 0.5 });
    const headland = straightTrack({ from: [-200, -200], headingDeg: 45, records: 1200 });
    const inner = Array.from({ length: 7 }, (_, k) =>
      straightTrack({
        from: [50 * k - 150, 50 * k - 250],
        headingDeg: 0,
        records: 220,
        startS: 400 + 100 * k,
      }),
    );
    const records = [...headland, ...inner.flat()];
    const value = (record: number, row: number) => {
      if (record < headland.length) return 900;
      const { eastM, northM } = records[record]!;
      const east = eastM + (row - 6.5) * 0.5;
      // Ground of the headland pass: within 3 m of the line north = east.
      return northM - east > -3 * Math.SQRT2 ? NaN : 900;
    };
    const log = makeLog({ records, rows: 12, channels: [{ id: "downforce", value }] });
    expect(findMirroredRows(place(log, machine), null)).toMatchObject({
      state: "as-logged",
      evidence: { runs: 7, agreeing: 7, opposing: 0 },
    });
    expect(findMirroredRows(place(mirror(log), machine), null)).toMatchObject({
      state: "mirrored",
      evidence: { runs: 7, agreeing: 0, opposing: 7 },
    });
  });

  it("cannot tell from a log without rows", () => {
    const log = makeLog({ records: straightTrack({ from: [0, 0], headingDeg: 0, records: 50 }), rows: 1 });
    expect(findMirroredRows(place(log, null), null).state).toBe("cannot-tell");
  });
});
