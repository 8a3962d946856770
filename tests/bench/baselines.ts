import { spawn } from "node:child_process";
import { once } from "node:events";
import { join } from "node:path";
import type { BenchContext } from "@/tests/bench/bench-context";
import type { BenchFile } from "@/tests/bench/bench-files";
import { findBinaries } from "@/scripts/cluster";

/** Milliseconds of a program from its start to its end. @throws Error where it fails or is not there */
async function runTimed(program: string, parameters: string[]): Promise<number> {
  const started = performance.now();
  // Not the synchronous call: a blocked loop would not notice that the server closed an idle connection.
  const child = spawn(program, parameters, { stdio: ["ignore", "inherit", "inherit"] });
  const [code] = (await once(child, "exit")) as [number | null];
  if (code !== 0) throw new Error(`${program} ended with ${code}`);
  return performance.now() - started;
}

/** Milliseconds of `psql \copy` of a CSV file into a flat table of a column each, client start included. */
export async function copyFlat({ server, database }: BenchContext, file: BenchFile, table = "flat"): Promise<number> {
  const columns = Array.from(
    { length: file.columns },
    (_, i) => `c${i} ${i === 0 ? "timestamptz" : "double precision"}`,
  );
  await database.query(`drop table if exists ${table}; create table ${table} (${columns.join(", ")})`);
  const command = `\\copy ${table} from '${file.path}' with (format csv, header true)`;
  return runTimed(join(findBinaries(), "psql"), ["-q", server.databaseAdminUrl, "-c", command]);
}

/** Milliseconds of `ogr2ogr` of a file into PostgreSQL, by COPY, as numbers: without looking at the types it would store texts. */
export async function copyByGdal({ server }: BenchContext, file: BenchFile): Promise<number> {
  const url = new URL(server.databaseAdminUrl);
  const target = `PG:host=${url.hostname} port=${url.port} user=${url.username} dbname=${url.pathname.slice(1)}`;
  const flags = ["--config", "PG_USE_COPY", "YES", "-f", "PostgreSQL", target, file.path];
  return runTimed("ogr2ogr", [...flags, "-oo", "AUTODETECT_TYPE=YES", "-nln", "flat_by_gdal", "-overwrite"]);
}
