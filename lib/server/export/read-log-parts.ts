import "server-only";
import { withOrganisation } from "@/db/client";
import { findLogResult } from "@/db/queries/log-results";
import type { LogRow } from "@/db/queries/logs";
import { readStoredRuns } from "@/db/queries/pass-readings";
import { AppError } from "@/lib/errors";
import type { LogPart } from "@/lib/export/export-table";
import { createLocalPlane } from "@/lib/geo/local-plane";
import { RECORD_COLUMNS, recordRuns, type RecordRun } from "@/lib/logs/packed-columns";
import type { Scope } from "@/lib/scope";
import { placeRun, type LogFrame } from "@/lib/server/export/place-run";
import { PlacedBody } from "@/lib/server/logs/placed-body";

type LogVersion = Pick<LogRow, "id" | "version">;

/** Readings fetched at once: about 4 MB. A single pass is never cut. */
const READINGS_A_FETCH = 1_000_000;

/** What is known of a version of a log without its records. `channels`: names of those to load, or all. */
export async function loadLogFrame(
  scope: Pick<Scope, "organisationId">,
  log: LogVersion,
  channels: "all" | readonly string[],
): Promise<LogFrame> {
  const key = { logId: log.id, version: log.version, kind: "placed" };
  const found = await withOrganisation(scope, (tx) => findLogResult(tx, scope, key));
  if (found === null) throw replaced();
  const body = PlacedBody.parse(found);
  const wanted = channels === "all" ? body.channels : body.channels.filter(({ id }) => channels.includes(id));
  return { body, plane: createLocalPlane(body.planeCentre.longitude, body.planeCentre.latitude), channels: wanted };
}

/**
 * The parts of a log in the file's order, a few passes at a time; no connection is held between them, so that a slow
 * download hinders nobody. @throws AppError `conflict` when a newer version takes the log's place on the way
 */
// kernel: who asks, of what log, and how much at a time
export async function* readLogParts(
  scope: Pick<Scope, "organisationId">,
  log: LogVersion,
  frame: LogFrame,
  readingsAFetch = READINGS_A_FETCH,
): AsyncGenerator<LogPart> {
  const names = [...Object.keys(RECORD_COLUMNS), ...frame.channels.map(({ id }) => id)];
  let logStartMs = NaN;
  for (const runs of groupRuns(frame, readingsAFetch)) {
    const first = runs[0]!;
    const records = { from: first.first, before: runs.at(-1)!.first + 1 };
    const stored = await readStoredRuns(scope, { logId: log.id, version: log.version, channels: names, records });
    for (const run of runs) {
      const own = stored.filter(({ firstSeq }) => firstSeq === run.first);
      const placed = placeRun(frame, run, own);
      if (!placed) throw replaced();
      if (Number.isNaN(logStartMs)) logStartMs = placed.log.timeMs.find((time) => Number.isFinite(time)) ?? NaN;
      yield { firstRecord: run.first, placed, logStartMs };
    }
  }
}

function* groupRuns({ body, channels }: LogFrame, readingsAFetch: number): Generator<RecordRun[]> {
  const aRecord = channels.reduce((sum, channel) => sum + channel.rows, Object.keys(RECORD_COLUMNS).length);
  let group: RecordRun[] = [];
  let readings = 0;
  const passes = body.passes.map((pass) => ({ ...pass, startedAtMs: NaN, endedAtMs: NaN, headingDeg: NaN }));
  for (const run of recordRuns(passes, body.records)) {
    if (group.length > 0 && readings + run.records * aRecord > readingsAFetch) {
      yield group;
      group = [];
      readings = 0;
    }
    group.push(run);
    readings += run.records * aRecord;
  }
  if (group.length > 0) yield group;
}

function replaced(): AppError {
  const message = "This log was read again while it was being exported. Export it once more.";
  return new AppError("conflict", message, { detailCode: "log_replaced" });
}
