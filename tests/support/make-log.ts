import { createLocalPlane } from "@/lib/geo/local-plane";
import type { LogChannel, MachineLog } from "@/lib/logs/machine-log";
import type { Seeder } from "@/lib/machines/machine";

export const TEST_ORIGIN = { longitude: -98.612, latitude: 38.417 };

/** One record of a hand-made track, metres about the test origin. */
export interface MadeRecord {
  eastM: number;
  northM: number;
  timeS?: number;
  headingDeg?: number;
  speedMps?: number;
  working?: boolean;
  pass?: number;
}

export interface MadeLog {
  records: MadeRecord[];
  rows?: number;
  channels?: {
    id: LogChannel["id"];
    unit?: LogChannel["unit"];
    resolution?: number;
    value: (record: number, row: number) => number;
  }[];
}

/** A small log from antenna places in metres; columns that no record carries are absent. */
export function makeLog({ records, rows = 4, channels = [] }: MadeLog): MachineLog {
  const plane = createLocalPlane(TEST_ORIGIN.longitude, TEST_ORIGIN.latitude);
  const degrees = records.map(({ eastM, northM }) => plane.toDegrees(eastM, northM));
  const has = (key: keyof MadeRecord) => records.some((record) => record[key] !== undefined);
  const start = Date.parse("2026-09-24T14:05:00.000Z");
  return {
    kind: "seeding",
    records: records.length,
    rows,
    timeMs: Float64Array.from(records, (record, i) => start + 1000 * (record.timeS ?? i * 0.2)),
    timeIsRelative: false,
    longitude: Float64Array.from(degrees, ([longitude]) => longitude),
    latitude: Float64Array.from(degrees, ([, latitude]) => latitude),
    headingDeg: has("headingDeg") ? Float32Array.from(records, (record) => record.headingDeg ?? NaN) : null,
    speedMps: has("speedMps") ? Float32Array.from(records, (record) => record.speedMps ?? NaN) : null,
    working: has("working") ? Uint8Array.from(records, (record) => (record.working === false ? 0 : 1)) : null,
    loggedPass: has("pass") ? Int32Array.from(records, (record) => record.pass ?? 0) : null,
    sourceLine: Uint32Array.from(records, (_, i) => i + 2),
    channels: channels.map(({ id, unit = "N", resolution = 1, value }) => ({
      id,
      unit,
      rows,
      perRow: true,
      resolution,
      values: Float32Array.from({ length: records.length * rows }, (_, k) =>
        value(Math.floor(k / rows), (k % rows) + 1),
      ),
    })),
  };
}

/** Records along a straight line, one every `stepM`. */
export function straightTrack(options: {
  from: [number, number];
  headingDeg: number;
  records: number;
  stepM?: number;
  startS?: number;
  stepS?: number;
}): MadeRecord[] {
  const { from, headingDeg, records, stepM = 0.5, startS = 0, stepS = 0.2 } = options;
  const heading = (headingDeg * Math.PI) / 180;
  return Array.from({ length: records }, (_, i) => ({
    eastM: from[0] + i * stepM * Math.sin(heading),
    northM: from[1] + i * stepM * Math.cos(heading),
    timeS: startS + i * stepS,
  }));
}

/** A plain rigid drill for tests. */
export function makeSeeder(given: Partial<Seeder> = {}): Seeder {
  return {
    kind: "seeder",
    name: "Test drill",
    rowCount: 4,
    rowSpacingM: 0.25,
    antennaToRowsM: 0,
    antennaRightM: 0,
    hitch: "rigid",
    rowUnitMassKg: 82,
    ...given,
  };
}
