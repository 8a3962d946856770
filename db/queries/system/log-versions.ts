import { and, eq, inArray, isNull, sql } from "drizzle-orm";
import { drizzle } from "drizzle-orm/node-postgres";
import type { PoolClient } from "pg";
import { from as copyFrom } from "pg-copy-streams";
import { adminDb } from "@/db/client";
import { BinaryCopyWriter } from "@/db/copy/binary-copy-writer";
import * as schema from "@/db/schema";
import { packedColumns, packRun, recordRuns, type RecordRun } from "@/lib/logs/packed-columns";
import type { PackedPlacedLog } from "@/lib/logs/packed-placed-log";

export interface VersionAnswers {
  results: { kind: string; body: unknown }[];
  /** Columns of the log's row that change with the version. */
  change: Partial<typeof schema.logs.$inferInsert>;
}

export interface NewVersion {
  organisationId: string;
  logId: string;
  version: number;
  placed: PackedPlacedLog;
  /** Worked out while the readings are written. A refusal undoes the whole version. */
  answers: Promise<VersionAnswers>;
  onProgress(share: number): void;
  /** Awaited before the log's row is touched, so that nothing else writes to it afterwards. */
  beforeSwitch(): Promise<void>;
}

/** Rows between two looks at the socket. */
const FLUSH_EVERY = 2048;

/**
 * Writes one version of a log and makes it the one that readers see, in one transaction; older versions go with it.
 * PostgreSQL takes no COPY under row-level security, so this runs as the owner.
 * @returns false, with nothing written, when the log was deleted or told to stop meanwhile
 */
export async function writeLogVersion(input: NewVersion): Promise<boolean> {
  const client = await adminDb().$client.connect();
  let isBroken = true;
  try {
    await client.query("begin");
    await removeVersions(client, input, "version >= $3");
    const runs = recordRuns(input.placed.passes, input.placed.log.records);
    await copyPoints(client, input);
    input.onProgress(0.3);
    await copyReadings(client, input, runs);
    input.onProgress(0.9);
    const answers = await input.answers;
    await input.beforeSwitch();
    const isSwitched = await switchVersion(client, input, answers);
    if (isSwitched) await removeVersions(client, input, "version > 0 and version < $3");
    await client.query(isSwitched ? "commit" : "rollback");
    isBroken = false;
    return isSwitched;
  } finally {
    client.release(isBroken);
  }
}

async function switchVersion(client: PoolClient, input: NewVersion, answers: VersionAnswers): Promise<boolean> {
  const tx = drizzle(client, { schema, casing: "snake_case" });
  const { organisationId, logId, version } = input;
  for (const { kind, body } of answers.results) {
    await tx.insert(schema.logResults).values({ organisationId, logId, version, kind, body });
  }
  const isOurs = and(
    eq(schema.logs.organisationId, organisationId),
    eq(schema.logs.id, logId),
    isNull(schema.logs.cancelRequestedAt),
  );
  const changed = await tx
    .update(schema.logs)
    .set({ ...answers.change, version, updatedAt: sql`now()` })
    .where(isOurs)
    .returning({ id: schema.logs.id });
  if (changed.length === 0) return false;
  // The job ends in the very moment the log is ready: no worker that dies between the two leaves one open.
  await tx
    .update(schema.jobs)
    .set({ state: "done", endedAt: sql`now()` })
    .where(
      and(
        eq(schema.jobs.organisationId, organisationId),
        eq(schema.jobs.subject, logId),
        inArray(schema.jobs.state, ["queued", "running"]),
      ),
    );
  return true;
}

async function removeVersions(client: PoolClient, input: NewVersion, which: string): Promise<void> {
  for (const table of ["log_points", "pass_readings", "log_results"]) {
    await client.query(`delete from ${table} where organisation_id = $1 and log_id = $2 and ${which}`, [
      input.organisationId,
      input.logId,
      input.version,
    ]);
  }
}

async function copyPoints(client: PoolClient, { organisationId, logId, version, placed }: NewVersion): Promise<void> {
  const columns = "organisation_id, log_id, version, seq, pass, time, lon, lat, heading_deg, speed_mps, flags";
  const writer = new BinaryCopyWriter(client.query(copyFrom(`copy log_points (${columns}) from stdin binary`)));
  const organisation = Buffer.from(organisationId);
  const id = Buffer.from(logId);
  const { log } = placed;
  for (let record = 0; record < log.records; record++) {
    writer.row(11);
    writer.text(organisation);
    writer.text(id);
    writer.int32(version);
    writer.int32(record);
    writer.int32(placed.passOf[record]!);
    writer.instant(log.timeIsRelative ? NaN : log.timeMs[record]!);
    writer.float64(log.longitude[record]!);
    writer.float64(log.latitude[record]!);
    writer.float32(placed.headingDeg[record]!);
    writer.float32(placed.speedMps[record]!);
    writer.int32(placed.flags[record]! | 0);
    if (record % FLUSH_EVERY === 0) await writer.flush();
  }
  await writer.finish();
}

async function copyReadings(client: PoolClient, input: NewVersion, runs: RecordRun[]): Promise<void> {
  const columns =
    "organisation_id, log_id, version, pass, channel, unit, element, first_seq, records, rows, west, south, east, north, values";
  const writer = new BinaryCopyWriter(client.query(copyFrom(`copy pass_readings (${columns}) from stdin binary`)));
  const organisation = Buffer.from(input.organisationId);
  const id = Buffer.from(input.logId);
  const packed = packedColumns(input.placed);
  for (const [order, run] of runs.entries()) {
    const box = boxOfRun(input.placed, run);
    for (const column of packed) {
      writer.row(15);
      writer.text(organisation);
      writer.text(id);
      writer.int32(input.version);
      writer.int32(run.pass);
      writer.text(Buffer.from(column.channel));
      writer.text(Buffer.from(column.unit));
      writer.text(Buffer.from(column.element));
      writer.int32(run.first);
      writer.int32(run.records);
      writer.int32(column.rows);
      for (const side of box) writer.float64(side);
      writer.binary(packRun(column, run));
    }
    await writer.flush();
    if (order % 16 === 0) input.onProgress(0.3 + (0.6 * order) / runs.length);
  }
  await writer.finish();
}

/** West, south, east, north of a run's positions; NaN without any. */
function boxOfRun({ log }: PackedPlacedLog, run: RecordRun): [number, number, number, number] {
  let [west, south, east, north] = [Infinity, Infinity, -Infinity, -Infinity];
  for (let record = run.first; record < run.first + run.records; record++) {
    const longitude = log.longitude[record]!;
    const latitude = log.latitude[record]!;
    if (Number.isNaN(longitude) || Number.isNaN(latitude)) continue;
    west = Math.min(west, longitude);
    east = Math.max(east, longitude);
    south = Math.min(south, latitude);
    north = Math.max(north, latitude);
  }
  return west > east ? [NaN, NaN, NaN, NaN] : [west, south, east, north];
}
