import { AsyncByteQueue, RecordBatchFileWriter, type Schema } from "apache-arrow";
import type { ExportAbout } from "@/lib/export/about";
import { newCells, type ExportBatch, type ExportTable } from "@/lib/export/export-table";
import { arrowBatch, arrowSchema } from "@/lib/export/write-arrow";

/** What the writer wrote since it was last asked. The writer's own streams take everything in before the first is read. */
class WrittenBytes extends AsyncByteQueue {
  private parts: Uint8Array[] = [];

  override write(part: Uint8Array): void {
    this.parts.push(part);
  }

  take(): Uint8Array {
    const taken = Buffer.concat(this.parts);
    this.parts = [];
    return taken;
  }
}

/** An Arrow file (the IPC file format), batch by batch; a table without rows still has its schema. */
export async function* arrowChunks(
  table: ExportTable,
  batches: AsyncIterable<ExportBatch>,
  about: ExportAbout,
): AsyncGenerator<Uint8Array> {
  const schema = arrowSchema(table, about);
  const { writer, written } = openWriter(schema);
  writer.write(arrowBatch(schema, table, emptyBatch(table)));
  for await (const batch of batches) {
    writer.write(arrowBatch(schema, table, batch));
    yield written.take();
  }
  writer.finish();
  yield written.take();
}

function openWriter(schema: Schema): { writer: RecordBatchFileWriter; written: WrittenBytes } {
  const written = new WrittenBytes();
  const writer = new RecordBatchFileWriter();
  writer.reset(written, schema);
  return { writer, written };
}

function emptyBatch({ columns, geometry }: ExportTable): ExportBatch {
  return {
    rows: 0,
    cells: columns.map((column) => newCells(column.kind, 0)),
    polygons: geometry === "polygon" ? [] : null,
  };
}
