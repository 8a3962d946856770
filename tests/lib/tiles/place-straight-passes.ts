import { createLocalPlane } from "@/lib/geo/local-plane";
import type { LogChannel } from "@/lib/logs/machine-log";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";

export interface StraightPasses {
  centre: [longitude: number, latitude: number];
  headingDeg: number;
  passes: number;
  recordsPerPass: number;
  stepM: number;
  rows: number;
  rowSpacingM: number;
  rowForwardM?: number[];
  /** Value of a reading; by default 1000 * pass + 10 * record within the pass + row. */
  value?: (pass: number, record: number, row: number) => number;
}

/** A placed log of straight parallel passes, all driven the same way, laid out side by side from the centre to the right. */
export function placeStraightPasses(options: StraightPasses): { placed: PlacedLog; channel: LogChannel } {
  const { centre, passes, recordsPerPass, stepM, rows, rowSpacingM } = options;
  const records = passes * recordsPerPass;
  const heading = (options.headingDeg * Math.PI) / 180;
  const value = options.value ?? ((pass, record, row) => 1000 * pass + 10 * record + row);
  const channel: LogChannel = {
    id: "downforce",
    unit: "N",
    rows,
    perRow: true,
    values: new Float32Array(records * rows),
    resolution: 1,
  };
  const originEastM = new Float64Array(records);
  const originNorthM = new Float64Array(records);
  const passOf = new Int32Array(records);
  const list: Pass[] = [];
  for (let pass = 1; pass <= passes; pass += 1) {
    const first = (pass - 1) * recordsPerPass;
    for (let step = 0; step < recordsPerPass; step += 1) {
      const right = (pass - 1) * rows * rowSpacingM;
      const ahead = step * stepM;
      originEastM[first + step] = right * Math.cos(heading) + ahead * Math.sin(heading);
      originNorthM[first + step] = -right * Math.sin(heading) + ahead * Math.cos(heading);
      passOf[first + step] = pass;
      for (let row = 1; row <= rows; row += 1) {
        channel.values[(first + step) * rows + row - 1] = value(pass, step, row);
      }
    }
    list.push({
      pass,
      first,
      records: recordsPerPass,
      startedAtMs: first * 1000,
      endedAtMs: (first + recordsPerPass) * 1000,
      headingDeg: options.headingDeg,
      lengthM: (recordsPerPass - 1) * stepM,
      headland: false,
    });
  }
  const placed: PlacedLog = {
    log: {
      kind: "seeding",
      records,
      rows,
      timeMs: Float64Array.from({ length: records }, (_, i) => i * 1000),
      timeIsRelative: false,
      longitude: new Float64Array(records),
      latitude: new Float64Array(records),
      headingDeg: null,
      speedMps: null,
      working: null,
      loggedPass: null,
      sourceLine: new Uint32Array(records),
      channels: [channel],
    },
    machine: null,
    geometry: {
      rows,
      offsetM: Float64Array.from({ length: rows }, (_, row) => (row - (rows - 1) / 2) * rowSpacingM),
      forwardM: Float64Array.from({ length: rows }, (_, row) => options.rowForwardM?.[row] ?? 0),
      widthM: new Float64Array(rows).fill(rowSpacingM),
    },
    plane: createLocalPlane(centre[0], centre[1]),
    originEastM,
    originNorthM,
    headingDeg: new Float32Array(records).fill(options.headingDeg),
    speedMps: new Float32Array(records).fill(stepM),
    flags: new Uint32Array(records),
    passOf,
    passes: list,
  };
  return { placed, channel };
}

/** The place in the middle of the cell of a reading (row from 1), in degrees. */
export function cellMiddle(placed: PlacedLog, options: StraightPasses, record: number, row: number): [number, number] {
  const heading = (options.headingDeg * Math.PI) / 180;
  const right = placed.geometry.offsetM[row - 1]!;
  const ahead = placed.geometry.forwardM[row - 1]! - options.stepM / 2;
  const [longitude, latitude] = placed.plane.toDegrees(
    placed.originEastM[record]! + right * Math.cos(heading) + ahead * Math.sin(heading),
    placed.originNorthM[record]! - right * Math.sin(heading) + ahead * Math.cos(heading),
  );
  return [longitude, latitude];
}
