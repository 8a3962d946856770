import { RADIANS_PER_DEGREE } from "@/lib/geo/circular-mean";
import type { LogChannel } from "@/lib/logs/machine-log";
import type { Pass, PlacedLog } from "@/lib/logs/placed-log";
import { rowPosition } from "@/lib/rows/row-position";

/** Where the rows of a pass begin or end to work: one entry a row that does, metres in the plane. */
export interface RowEdge {
  pass: Pass;
  end: "start" | "finish";
  /** Heading of the implement there. */
  headingDeg: number;
  eastM: number[];
  northM: number[];
  /** Distance from record to record there: no place is known better. */
  stepM: number;
}

/**
 * The start and the finish of every pass, row by row. A row works at a record where any per-row channel has a reading other
 * than 0, since switched-off sections are logged as nothing or as 0.
 */
export function findRowEdges(placed: PlacedLog): RowEdge[] {
  const channels = placed.log.channels.filter((channel) => channel.perRow);
  if (channels.length === 0) return [];
  return placed.passes.flatMap((pass) => {
    const records = passRecords(placed, pass);
    if (records.length < 3) return [];
    const starts = firstWorking(channels, records, placed.geometry.rows);
    const finishes = firstWorking(channels, [...records].reverse(), placed.geometry.rows);
    return [describeEdge(placed, pass, starts, "start"), describeEdge(placed, pass, finishes, "finish")];
  });
}

function passRecords(placed: PlacedLog, pass: Pass): number[] {
  const records: number[] = [];
  for (let i = pass.first; i < pass.first + pass.records; i++) {
    if (placed.passOf[i] === pass.pass && Number.isFinite(placed.headingDeg[i]!)) records.push(i);
  }
  return records;
}

/** The first of `records` at which each row works; -1 for a row that never does. */
function firstWorking(channels: readonly LogChannel[], records: readonly number[], rows: number): Int32Array {
  const found = new Int32Array(rows).fill(-1);
  let open = rows;
  for (const record of records) {
    if (open === 0) break;
    for (let row = 0; row < rows; row++) {
      if (found[row]! >= 0 || !channels.some((channel) => works(channel, record, row))) continue;
      found[row] = record;
      open--;
    }
  }
  return found;
}

function works(channel: LogChannel, record: number, row: number): boolean {
  const value = channel.values[record * channel.rows + row]!;
  return value !== 0 && !Number.isNaN(value);
}

function describeEdge(placed: PlacedLog, pass: Pass, records: Int32Array, end: RowEdge["end"]): RowEdge {
  const eastM: number[] = [];
  const northM: number[] = [];
  let [sin, cos, stepM, seen] = [0, 0, 0, 0];
  records.forEach((record, row) => {
    if (record < 0) return;
    const [east, north] = rowPosition(placed, record, row + 1);
    eastM.push(east);
    northM.push(north);
    const heading = placed.headingDeg[record]! * RADIANS_PER_DEGREE;
    sin += Math.sin(heading);
    cos += Math.cos(heading);
    const beside = record > pass.first ? record - 1 : record + 1;
    const step = Math.hypot(
      placed.originEastM[record]! - placed.originEastM[beside]!,
      placed.originNorthM[record]! - placed.originNorthM[beside]!,
    );
    if (Number.isFinite(step)) [stepM, seen] = [stepM + step, seen + 1];
  });
  const headingDeg = Math.atan2(sin, cos) / RADIANS_PER_DEGREE;
  return { pass, end, headingDeg, eastM, northM, stepM: seen > 0 ? stepM / seen : NaN };
}
