import { withOrganisation } from "@/db/client";
import { findLogResult } from "@/db/queries/log-results";
import type { LogRow } from "@/db/queries/logs";
import { readStoredRuns, type StoredRun } from "@/db/queries/pass-readings";
import { AppError } from "@/lib/errors";
import { createLocalPlane } from "@/lib/geo/local-plane";
import type { LogChannel } from "@/lib/logs/machine-log";
import { RECORD_COLUMNS, type RecordColumnName } from "@/lib/logs/packed-columns";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { cachedForLog } from "@/lib/server/logs/log-cache";
import { PlacedBody } from "@/lib/server/logs/placed-body";

export type LogVersion = Pick<LogRow, "organisationId" | "id" | "version">;

/** A placed log whose readings are not loaded yet, and what channels there are. */
interface LoadedBase {
  placed: PlacedLog;
  channels: PlacedBody["channels"];
}

/**
 * A log as it was placed (without its adjustments), with the readings that `channel` needs (all of them for `"all"`, none for null). Both parts are
 * cached by version. The caller has found `log` under its own scope. @throws AppError `conflict` before the first version
 */
export async function loadPlacedLog(log: LogVersion, channel: string | "all" | null): Promise<PlacedLog> {
  if (log.version === 0) {
    throw new AppError("conflict", "This log has not been read yet.", { detailCode: "log_not_ready" });
  }
  const base = await cachedForLog(`${log.id}:${log.version}:base`, () => loadBase(log));
  const wanted = channel === "all" ? base.channels.map(({ id }) => id) : loggedChannels(channel);
  const found = base.channels.filter(({ id }) => wanted.includes(id));
  const channels = await Promise.all(
    found.map((one) =>
      cachedForLog(`${log.id}:${log.version}:${one.id}`, () => loadReadings(log, one, base.placed.log.records)),
    ),
  );
  return { ...base.placed, log: { ...base.placed.log, channels } };
}

/** The logged channels that a channel, logged or derived, is made from. */
export function loggedChannels(channel: string | null): string[] {
  if (channel === null || channel === "rowSpeed" || channel === "flags") return [];
  if (channel === "resistance" || channel === "marginByForce") return ["downforce", "margin"];
  if (channel === "underTarget") return ["margin"];
  if (channel === "atLimit") return ["downforce"];
  if (channel.startsWith("deviation:")) return loggedChannels(channel.slice("deviation:".length));
  return [channel];
}

async function loadBase(log: LogVersion): Promise<{ value: LoadedBase; bytes: number }> {
  const scope = { organisationId: log.organisationId };
  const key = { logId: log.id, version: log.version, kind: "placed" };
  const body = PlacedBody.parse(await withOrganisation(scope, (tx) => findLogResult(tx, scope, key)));
  const names = Object.keys(RECORD_COLUMNS);
  const runs = await readStoredRuns(scope, { logId: log.id, version: log.version, channels: names });
  const { records } = body;
  const of = (name: RecordColumnName) => joinRuns(runs, name, records);
  const number = (value: number | null) => value ?? NaN;
  const optional = (name: RecordColumnName) => (runs.some((run) => run.channel === name) ? of(name) : null);
  const placed: PlacedLog = {
    log: {
      kind: body.kind,
      records,
      rows: body.rows,
      timeIsRelative: body.timeIsRelative,
      timeMs: of("record:time"),
      longitude: of("record:longitude"),
      latitude: of("record:latitude"),
      headingDeg: toFloat32(optional("record:loggedHeading")),
      speedMps: toFloat32(optional("record:loggedSpeed")),
      working: toArray(optional("record:working"), Uint8Array),
      loggedPass: toArray(optional("record:loggedPass"), Int32Array),
      sourceLine: Uint32Array.from(of("record:sourceLine")),
      channels: [],
    },
    machine: body.machine,
    geometry: {
      rows: body.geometry.rows,
      offsetM: Float64Array.from(body.geometry.offsetM),
      forwardM: Float64Array.from(body.geometry.forwardM),
      widthM: Float64Array.from(body.geometry.widthM),
    },
    plane: createLocalPlane(body.planeCentre.longitude, body.planeCentre.latitude),
    originEastM: of("record:originEast"),
    originNorthM: of("record:originNorth"),
    headingDeg: Float32Array.from(of("record:heading")),
    speedMps: Float32Array.from(of("record:speed")),
    flags: Uint32Array.from(of("record:flags")),
    passOf: Int32Array.from(of("record:passOf")),
    passes: body.passes.map((pass) => ({
      ...pass,
      startedAtMs: number(pass.startedAtMs),
      endedAtMs: number(pass.endedAtMs),
      headingDeg: number(pass.headingDeg),
    })),
  };
  return { value: { placed, channels: body.channels }, bytes: records * 96 + 50_000 };
}

async function loadReadings(
  log: LogVersion,
  channel: PlacedBody["channels"][number],
  records: number,
): Promise<{ value: LogChannel; bytes: number }> {
  const scope = { organisationId: log.organisationId };
  const runs = await readStoredRuns(scope, { logId: log.id, version: log.version, channels: [channel.id] });
  // Shared with the thread that works out what cleaning rules take out, so that nothing is copied to it.
  const values = new Float32Array(new SharedArrayBuffer(records * channel.rows * 4)).fill(NaN);
  const bytes = new Uint8Array(values.buffer);
  // Both ends are little-endian, as every machine this runs on.
  for (const run of runs) bytes.set(run.values, run.firstSeq * channel.rows * 4);
  return { value: { ...channel, id: channel.id as LogChannel["id"], values }, bytes: values.byteLength };
}

/** A per-record array put together from its runs. */
function joinRuns(runs: readonly StoredRun[], name: RecordColumnName, records: number): Float64Array {
  const joined = new Float64Array(records).fill(NaN);
  for (const run of runs) {
    if (run.channel !== name) continue;
    joined.set(readValues(run), run.firstSeq);
  }
  return joined;
}

function readValues({ values, element }: StoredRun): Float64Array | Float32Array | Uint32Array {
  // Fields of a COPY are not aligned: a copy is.
  const aligned = Uint8Array.from(values).buffer;
  if (element === "f8") return new Float64Array(aligned);
  return element === "f4" ? new Float32Array(aligned) : new Uint32Array(aligned);
}

function toFloat32(values: Float64Array | null): Float32Array | null {
  return values ? Float32Array.from(values) : null;
}

function toArray<Target>(
  values: Float64Array | null,
  target: { from(values: Iterable<number>): Target },
): Target | null {
  return values ? target.from(values) : null;
}
