import type { MachineLog } from "@/lib/logs/machine-log";
import { FILE_STYLE_DEFAULTS, type FileStyle } from "@/lib/simulator/writers/file-style";
import { type LogColumn, wideColumns } from "@/lib/simulator/writers/log-columns";

/** One point feature a record, its readings as properties named like the columns of the wide file; piece by piece. */
export function* writeGeoJsonChunks(log: MachineLog, input: Partial<FileStyle> = {}): Generator<string> {
  const style = { ...FILE_STYLE_DEFAULTS, ...input };
  const columns = wideColumns(log, style);
  const [, longitude, latitude] = columns;
  const properties = columns.filter((column) => column !== longitude && column !== latitude);
  yield '{"type":"FeatureCollection","features":[\n';
  for (let record = 0; record < log.records; record += 1) {
    yield (
      (record > 0 ? ",\n" : "") +
      JSON.stringify({
        type: "Feature",
        geometry: geometryAt(longitude, latitude, record),
        properties: Object.fromEntries(properties.map((column) => [column.name, valueAt(column, record)])),
      })
    );
  }
  yield "\n]}\n";
}

export function writeGeoJson(log: MachineLog, style: Partial<FileStyle> = {}): string {
  return [...writeGeoJsonChunks(log, style)].join("");
}

function geometryAt(longitude: LogColumn | undefined, latitude: LogColumn | undefined, record: number): object | null {
  const lon = longitude ? valueAt(longitude, record) : null;
  const lat = latitude ? valueAt(latitude, record) : null;
  return lon === null || lat === null ? null : { type: "Point", coordinates: [lon, lat] };
}

function valueAt(column: LogColumn, record: number): number | string | null {
  const value = column.at(record);
  return typeof value === "number" ? Number(value.toFixed(column.decimals)) : value;
}
