import type { ExportAbout } from "@/lib/export/about";
import type { ExportBatch, ExportTable } from "@/lib/export/export-table";
import { csvHead, csvLines } from "@/lib/export/write-csv";
import { GEOJSON_END, geojsonFeatures, geojsonHead } from "@/lib/export/write-geojson";

const encoder = new TextEncoder();

export async function* csvChunks(table: ExportTable, batches: AsyncIterable<ExportBatch>): AsyncGenerator<Uint8Array> {
  yield encoder.encode(csvHead(table));
  for await (const batch of batches) yield encoder.encode(csvLines(table, batch));
}

export async function* geojsonChunks(
  table: ExportTable,
  batches: AsyncIterable<ExportBatch>,
  about: ExportAbout,
): AsyncGenerator<Uint8Array> {
  yield encoder.encode(geojsonHead(about));
  let isFirst = true;
  for await (const batch of batches) {
    yield encoder.encode(geojsonFeatures(table, batch, isFirst));
    isFirst = false;
  }
  yield encoder.encode(GEOJSON_END);
}
