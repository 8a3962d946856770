import { expect } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { describeExport, type ExportAbout } from "@/lib/export/about";
import type { ReadingsTable } from "@/lib/export/columns/readings-table";
import { channelIds, readingsBatches, readingsTable } from "@/lib/export/columns/readings-table";
import { wideReadingsTable } from "@/lib/export/columns/wide-readings-table";
import type { ExportBatch, ExportShape, ExportTable } from "@/lib/export/export-table";
import { logParts, outlineOf } from "@/lib/export/log-parts";
import { readAgainMapping } from "@/lib/export/read-again-mapping";
import type { MachineLog } from "@/lib/logs/machine-log";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { Seeder } from "@/lib/machines/machine";
import { rowStatistics } from "@/lib/statistics/row-statistics";

/** The log on the ground; fails the test where it cannot be placed. */
export function mustBuild(log: MachineLog, machine: Seeder | null): PlacedLog {
  const built = buildLog(log, machine);
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

export interface MadeExport {
  table: ReadingsTable;
  batches: ExportBatch[];
  about: ExportAbout;
}

/** The readings of a placed log as an export would write them. */
export function exportReadings(
  placed: PlacedLog,
  shape: ExportShape = "long",
  names: "name" | "shortName" = "name",
): MadeExport {
  const outline = outlineOf(placed);
  const table = shape === "wide" ? wideReadingsTable(outline) : readingsTable(outline);
  const batches = [...logParts(placed)].flatMap((part) => [...readingsBatches(table, part)]);
  const readAgain = readAgainMapping({ table, shape, channels: placed.log.channels, names });
  return { table, batches, about: aboutOf({ table, outline, shape, readAgain }) };
}

type Described = Pick<Parameters<typeof describeExport>[0], "table" | "outline" | "shape" | "readAgain">;

export function aboutOf(described: Described): ExportAbout {
  return describeExport({
    ...described,
    madeAt: "2026-12-01T12:00:00.000Z",
    log: { id: "log_one", name: "East quarter", kind: "seeding", version: 1, startedAt: null, endedAt: null },
    source: { fileName: "east.csv", bytes: 1000, sha256: "ab".repeat(32), files: [] },
    recipe: null,
    adjustments: null,
    notes: [],
    choice: null,
  });
}

const STATISTICS = ["mean", "sd", "p05", "p50", "p95", "distanceM", "shareUnderTarget"] as const;

/** The same passes, and the same statistics of every row in every channel within the rounding of places and readings. */
export function expectSameLog(found: PlacedLog, wanted: PlacedLog): void {
  const outline = ({ passes }: PlacedLog) => passes.map(({ pass, first, records }) => ({ pass, first, records }));
  expect(outline(found)).toEqual(outline(wanted));
  for (const id of channelIds(wanted)) {
    const items = rowStatistics(found, id).items;
    rowStatistics(wanted, id).items.forEach((item, index) => {
      const other = items[index]!;
      expect(other.n).toBe(item.n);
      expect(other.flagged).toBe(item.flagged);
      for (const name of STATISTICS) {
        const [a, b] = [item[name], other[name]];
        expect(b === null).toBe(a === null);
        // Eight decimals of a degree are a millimetre, on steps of some decimetres.
        if (a !== null && b !== null) expect(Math.abs(b - a)).toBeLessThanOrEqual(0.002 * Math.abs(a) + 1e-3);
      }
    });
  }
}

/** All cells of a named column. */
export function cellsOf(table: ExportTable, batches: readonly ExportBatch[], name: string): (number | string | null)[] {
  const index = table.columns.findIndex((column) => column.name === name);
  if (index < 0) throw new Error(`no column ${name} in ${table.columns.map((column) => column.name).join(", ")}`);
  return batches.flatMap((batch) => [...batch.cells[index]!]);
}

/** `batches` as an export reads them: one after the other. */
export async function* asAsync<Item>(items: Iterable<Item>): AsyncGenerator<Item> {
  yield* items;
}

export async function joinChunks(chunks: AsyncIterable<Uint8Array>): Promise<Uint8Array> {
  const all: Uint8Array[] = [];
  for await (const chunk of chunks) all.push(chunk);
  return new Uint8Array(Buffer.concat(all));
}
