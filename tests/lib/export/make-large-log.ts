import { createLocalPlane } from "@/lib/geo/local-plane";
import type { LogPart } from "@/lib/export/export-table";
import { evenRowGeometry } from "@/lib/rows/row-geometry";
import { makeSeeder, TEST_ORIGIN } from "@/tests/support/make-log";

export interface LargeLog {
  passes: number;
  recordsAPass: number;
  rows: number;
}

/** A log too large to be held, made pass by pass as it is asked for. */
export async function* largeLogParts({ passes, recordsAPass, rows }: LargeLog): AsyncGenerator<LogPart> {
  for (let pass = 1; pass <= passes; pass++) yield largeLogPart({ pass, records: recordsAPass, rows });
}

export function largeLogPart({ pass, records, rows }: { pass: number; records: number; rows: number }): LogPart {
  const plane = createLocalPlane(TEST_ORIGIN.longitude, TEST_ORIGIN.latitude);
  const firstRecord = (pass - 1) * records;
  const numbers = (of: (record: number) => number) => Float64Array.from({ length: records }, (_, record) => of(record));
  const timeMs = numbers((record) => Date.parse("2026-09-24T14:05:00.000Z") + 200 * (firstRecord + record));
  const channel = (id: "downforce" | "margin", base: number) => ({
    id,
    unit: "N" as const,
    rows,
    perRow: true,
    resolution: 0.1,
    values: Float32Array.from({ length: records * rows }, (_, at) => base + ((at * 7919 + pass * 31) % 5000) / 10),
  });
  return {
    firstRecord,
    logStartMs: Date.parse("2026-09-24T14:05:00.000Z"),
    placed: {
      log: {
        kind: "seeding",
        records,
        rows,
        timeMs,
        timeIsRelative: false,
        longitude: numbers((record) => TEST_ORIGIN.longitude + pass * 1e-4 + record * 1e-7),
        latitude: numbers((record) => TEST_ORIGIN.latitude + record * 4e-6),
        headingDeg: null,
        speedMps: null,
        working: null,
        loggedPass: null,
        sourceLine: Uint32Array.from({ length: records }, (_, record) => firstRecord + record + 2),
        channels: [channel("downforce", 600), channel("margin", 100)],
      },
      machine: makeSeeder({ rowCount: rows }),
      geometry: evenRowGeometry(rows, 0.19),
      plane,
      originEastM: numbers(() => pass * 8),
      originNorthM: numbers((record) => record * 0.45),
      headingDeg: new Float32Array(records),
      speedMps: new Float32Array(records).fill(2.25),
      flags: new Uint32Array(records),
      passOf: new Int32Array(records).fill(pass),
      passes: [
        {
          pass,
          first: 0,
          records,
          startedAtMs: timeMs[0]!,
          endedAtMs: timeMs.at(-1)!,
          headingDeg: 0,
          lengthM: records * 0.45,
          headland: false,
        },
      ],
    },
  };
}
