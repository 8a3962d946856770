import { spawn } from "node:child_process";
import { once } from "node:events";
import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { Client } from "pg";
import { inspectLog } from "@/lib/ingest";
import { bytesSource } from "@/lib/ingest/byte-source";
import { BENCHMARK_STYLE, createBenchmarkLog, type BenchmarkSize } from "@/lib/simulator/benchmark-log";
import { writeWideCsvChunks } from "@/lib/simulator/writers/write-csv";
import { findBinaries } from "@/scripts/cluster";
import { medianOf, pairedRatio, printRatio } from "@/tests/bench/ratios";
import type { TestServer } from "@/tests/support/server";

export interface BenchFile {
  size: BenchmarkSize;
  bytes: Buffer;
  path: string;
  columns: number;
  mapping: string;
}

/** A benchmark log as a wide CSV file, with the mapping a person would confirm. */
export async function makeBenchFile(size: BenchmarkSize, folder: string): Promise<BenchFile> {
  const bytes = Buffer.concat(
    [...writeWideCsvChunks(createBenchmarkLog(size), BENCHMARK_STYLE)].map((chunk) => Buffer.from(chunk)),
  );
  const path = join(folder, `${size}.csv`);
  writeFileSync(path, bytes);
  const inspected = await inspectLog(bytesSource(`${size}.csv`, bytes));
  if (!inspected.ok) throw new Error(inspected.error.message);
  const columns = inspected.value.columns.flatMap(({ name, proposal }) =>
    proposal?.unit ? [{ name, channel: proposal.channel, row: proposal.row, unit: proposal.unit }] : [],
  );
  const mapping = JSON.stringify({ shape: inspected.value.shape, columns });
  return { size, bytes, path, columns: inspected.value.columns.length, mapping };
}

export interface BenchContext {
  server: TestServer;
  database: Client;
  cookie: string;
  fieldId: string;
  machineId: string;
}

/** Milliseconds of `psql \copy` of the file into a flat table, client start included. */
async function copyFlat({ server, database }: BenchContext, file: BenchFile): Promise<number> {
  const columns = Array.from(
    { length: file.columns },
    (_, i) => `c${i} ${i === 0 ? "timestamptz" : "double precision"}`,
  );
  await database.query(`drop table if exists flat; create table flat (${columns.join(", ")})`);
  const command = `\\copy flat from '${file.path}' with (format csv, header true)`;
  const started = performance.now();
  // Not the synchronous call: a blocked loop would not notice that the server closed an idle connection.
  const psql = spawn(join(findBinaries(), "psql"), ["-q", server.databaseAdminUrl, "-c", command], {
    stdio: ["ignore", "inherit", "inherit"],
  });
  const [code] = (await once(psql, "exit")) as [number | null];
  if (code !== 0) throw new Error(`psql ended with ${code}`);
  return performance.now() - started;
}

/** Milliseconds from the first byte sent to a log that is ready: stored, placed, described, committed. */
async function uploadToReady(
  context: BenchContext,
  file: BenchFile,
): Promise<{ ms: number; postMs: number; logId: string }> {
  const { server, database, cookie, fieldId, machineId } = context;
  const form = new FormData();
  form.set("mapping", file.mapping);
  form.set("machineId", machineId);
  form.set("file", new File([new Uint8Array(file.bytes)], `${file.size}.csv`));
  const started = performance.now();
  const response = await fetch(`${server.baseUrl}/api/v1/fields/${fieldId}/logs?again=1`, {
    method: "POST",
    headers: { cookie, origin: server.baseUrl },
    body: form,
  });
  const body = (await response.json()) as { id: string };
  const postMs = performance.now() - started;
  if (response.status !== 202) throw new Error(`upload: ${response.status} ${JSON.stringify(body)}`);
  for (;;) {
    const { rows } = await database.query<{ status: string; error: unknown }>(
      "select status, error from logs where id = $1",
      [body.id],
    );
    const status = rows[0]?.status;
    if (status === "ready") return { ms: performance.now() - started, postMs, logId: body.id };
    if (status !== "queued" && status !== "reading" && status !== "building") {
      throw new Error(`the log ended as ${status}: ${JSON.stringify(rows[0]?.error)}`);
    }
    await new Promise((resolve) => setTimeout(resolve, 4));
  }
}

/** Forgets the highest memory so far. Needs the rights to do so; without them the peak covers all rounds. */
function resetPeak(pid: number): void {
  try {
    writeFileSync(`/proc/${pid}/clear_refs`, "5");
  } catch {
    // The peak then includes what came before.
  }
}

function peakMib(pid: number): number {
  const line = /VmHWM:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, "utf8"))?.[1];
  return Number(line) / 1024;
}

/** One pair after another; the first of each is left out (caches, compilation). Leaves the last log in place. */
export async function measureUpload(context: BenchContext, file: BenchFile, rounds: number): Promise<string> {
  const pid = context.server.worker.process.pid ?? 0;
  const pairs: { ours: number; base: number }[] = [];
  const posts: { ours: number; base: number }[] = [];
  const peaks: number[] = [];
  let last = "";
  // Making the file held this process up; connections that the server closed meanwhile are noticed now.
  await new Promise((resolve) => setTimeout(resolve, 100));
  for (let round = 0; round <= rounds; round++) {
    resetPeak(pid);
    const { ms, postMs, logId } = await uploadToReady(context, file);
    peaks.push(peakMib(pid));
    last = logId;
    const base = await copyFlat(context, file);
    if (round === 0) continue;
    pairs.push({ ours: ms, base });
    posts.push({ ours: postMs, base });
  }
  const megabytes = (file.bytes.length / 1e6).toFixed(1);
  const goal = file.size === "large" ? "aim: at most 2.0" : "";
  printRatio(`${file.size} wide CSV (${megabytes} MB), upload to ready / psql \\copy`, pairedRatio(pairs), goal);
  printRatio(`  of that, answering the upload / psql \\copy`, pairedRatio(posts));
  const peak = medianOf(peaks.slice(1));
  const ratio = ((peak * 1024 * 1024) / file.bytes.length).toFixed(1);
  printRatio(`  peak memory of the worker process / file size`, ratio, `${Math.round(peak)} MiB`);
  return last;
}
