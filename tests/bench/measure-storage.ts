import { to as copyTo } from "pg-copy-streams";
import { readStoredRuns } from "@/db/queries/pass-readings";
import type { BenchContext } from "@/tests/bench/bench-context";
import type { BenchFile } from "@/tests/bench/bench-files";
import { printGoal, type Pair } from "@/tests/bench/ratios";
import { uploadToReady } from "@/tests/bench/upload-to-ready";

const CHANNEL = "margin";
const COPY_HEADER_BYTES = 19;

/** Bytes on disk of all tables that hold logs, with their indexes and long values. */
async function storedBytes({ database }: BenchContext): Promise<number> {
  const { rows } = await database.query<{ bytes: string }>(
    `select sum(pg_total_relation_size(relid)) as bytes from pg_partition_tree('pass_readings')
     union all select sum(pg_total_relation_size(relid)) from pg_partition_tree('log_points')
     union all select pg_total_relation_size('log_results')
     union all select pg_total_relation_size('logs')`,
  );
  return rows.reduce((sum, { bytes }) => sum + Number(bytes), 0);
}

/** What one more log takes on disk against its file. One measurement: bytes do not vary. */
export async function measureStoredBytes(context: BenchContext, file: BenchFile): Promise<void> {
  const before = await storedBytes(context);
  await uploadToReady(context, file);
  const stored = (await storedBytes(context)) - before;
  printGoal("bytes stored of a large log / its wide CSV", [{ ours: stored, base: file.bytes }], { atMost: 0.7 });
}

/** One channel from the store into a typed array, as a request does it: under row-level security, by binary COPY. */
async function readOurs(organisationId: string, logId: string, size: number): Promise<Float32Array> {
  const values = new Float32Array(size).fill(NaN);
  const bytes = new Uint8Array(values.buffer);
  const runs = await readStoredRuns({ organisationId }, { logId, version: 1, channels: [CHANNEL] });
  for (const run of runs) bytes.set(run.values, run.firstSeq * run.rows * 4);
  return values;
}

/** The same readings out of a flat table by binary COPY: one float8 a row unit, in record order. */
async function readFlat({ database }: BenchContext, columns: readonly number[], size: number): Promise<Float32Array> {
  const chosen = columns.map((column) => `c${column}`).join(", ");
  const chunks: Buffer[] = [];
  for await (const chunk of database.query(copyTo(`copy (select ${chosen} from flat) to stdout binary`))) {
    chunks.push(chunk as Buffer);
  }
  const all = Buffer.concat(chunks);
  const view = new DataView(all.buffer, all.byteOffset, all.byteLength);
  const values = new Float32Array(size);
  let place = 0;
  for (let at = COPY_HEADER_BYTES; view.getInt16(at) >= 0;) {
    at += 2;
    for (let field = 0; field < columns.length; field++) {
      const length = view.getInt32(at);
      values[place++] = length < 0 ? NaN : view.getFloat64(at + 4);
      at += 4 + Math.max(0, length);
    }
  }
  return values;
}

function sumOf(values: Float32Array): number {
  return values.reduce((sum, value) => (Number.isNaN(value) ? sum : sum + value), 0);
}

/** One channel of the large log back into a typed array; the flat table is what `copyFlat` left of the same file. */
export async function measureReadBack(
  context: BenchContext,
  input: { file: BenchFile; logId: string; rounds: number },
): Promise<void> {
  const { server, database } = context;
  process.env.DATABASE_URL = server.environment.DATABASE_URL;
  const { rows } = await database.query<{ organisation_id: string; counts: { records: number; rows: number } }>(
    "select organisation_id, counts from logs where id = $1",
    [input.logId],
  );
  const { organisation_id: organisationId, counts } = rows[0]!;
  const size = counts.records * counts.rows;
  const columns = input.file.mapping.columns.flatMap(({ channel }, k) => (channel === CHANNEL ? [k] : []));
  const pairs: Pair[] = [];
  for (let round = 0; round <= input.rounds; round++) {
    const first = performance.now();
    const ours = await readOurs(organisationId, input.logId, size);
    const second = performance.now();
    const flat = await readFlat(context, columns, size);
    const pair = { ours: second - first, base: performance.now() - second };
    if (Math.abs(sumOf(ours) - sumOf(flat)) > 1e-6 * Math.abs(sumOf(flat))) {
      throw new Error(`the two readings differ: ${sumOf(ours)} and ${sumOf(flat)}`);
    }
    if (round > 0) pairs.push(pair);
  }
  printGoal("one channel into a typed array / COPY BINARY from a flat table", pairs, { atMost: 0.4 });
}
