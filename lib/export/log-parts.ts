import type { LogPart } from "@/lib/export/export-table";
import type { LogChannel } from "@/lib/logs/machine-log";
import { recordRuns, type RecordRun } from "@/lib/logs/packed-columns";
import type { PlacedLog } from "@/lib/logs/placed-log";

/** A log held in memory as the parts that exports are made of: every pass, and the records between passes. */
export function* logParts(placed: PlacedLog): Generator<LogPart> {
  const logStartMs = placed.log.timeMs.find((time) => Number.isFinite(time)) ?? NaN;
  for (const run of recordRuns(placed.passes, placed.log.records)) {
    yield { firstRecord: run.first, placed: cutRun(placed, run), logStartMs };
  }
}

/** A log without records, for what is known of it before a reading is looked at. */
export function outlineOf(placed: PlacedLog): PlacedLog {
  return { ...cutRun(placed, { pass: 0, first: 0, records: 0 }), passes: placed.passes };
}

function cutRun(placed: PlacedLog, run: RecordRun): PlacedLog {
  const { log } = placed;
  const end = run.first + run.records;
  const cut = <Numbers extends { subarray: (from: number, to: number) => Numbers }>(values: Numbers) =>
    values.subarray(run.first, end);
  const channel = (one: LogChannel): LogChannel => ({
    ...one,
    values: one.values.subarray(run.first * one.rows, end * one.rows),
  });
  const pass = placed.passes.find((one) => one.pass === run.pass);
  return {
    ...placed,
    log: {
      ...log,
      records: run.records,
      timeMs: cut(log.timeMs),
      longitude: cut(log.longitude),
      latitude: cut(log.latitude),
      headingDeg: log.headingDeg && cut(log.headingDeg),
      speedMps: log.speedMps && cut(log.speedMps),
      working: log.working && cut(log.working),
      loggedPass: log.loggedPass && cut(log.loggedPass),
      sourceLine: cut(log.sourceLine),
      channels: log.channels.map(channel),
    },
    originEastM: cut(placed.originEastM),
    originNorthM: cut(placed.originNorthM),
    headingDeg: cut(placed.headingDeg),
    speedMps: cut(placed.speedMps),
    flags: cut(placed.flags),
    passOf: cut(placed.passOf),
    passes: pass ? [{ ...pass, first: 0, records: run.records }] : [],
  };
}
