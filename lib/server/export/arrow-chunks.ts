import { Readable } from "node:stream";
import { pipeline } from "node:stream/promises";
import { RecordBatchFileWriter, type RecordBatch } from "apache-arrow";
import type { ExportAbout } from "@/lib/export/about";
import { newCells, type ExportBatch, type ExportTable } from "@/lib/export/export-table";
import { arrowBatch, arrowSchema } from "@/lib/export/write-arrow";

/** An Arrow file (the IPC file format), batch by batch; a table without rows still has its schema. */
export async function* arrowChunks(
  table: ExportTable,
  batches: AsyncIterable<ExportBatch>,
  about: ExportAbout,
): AsyncGenerator<Uint8Array> {
  const writer = RecordBatchFileWriter.throughNode();
  const feeding = pipeline(Readable.from(recordBatches(table, batches, about), { highWaterMark: 1 }), writer);
  // A fault of the source ends the loop below with the same error.
  feeding.catch(() => undefined);
  for await (const chunk of writer) yield chunk as Uint8Array;
}

async function* recordBatches(
  table: ExportTable,
  batches: AsyncIterable<ExportBatch>,
  about: ExportAbout,
): AsyncGenerator<RecordBatch> {
  const schema = arrowSchema(table, about);
  let isEmpty = true;
  for await (const batch of batches) {
    isEmpty = false;
    yield arrowBatch(schema, table, batch);
  }
  if (isEmpty) yield arrowBatch(schema, table, emptyBatch(table));
}

function emptyBatch({ columns, geometry }: ExportTable): ExportBatch {
  return {
    rows: 0,
    cells: columns.map((column) => newCells(column.kind, 0)),
    polygons: geometry === "polygon" ? [] : null,
  };
}
