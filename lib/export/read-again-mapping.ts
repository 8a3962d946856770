import type { ReadingsTable } from "@/lib/export/columns/readings-table";
import type { ExportShape } from "@/lib/export/export-table";
import type { LogMapping, MappedColumn } from "@/lib/ingest/mapping";
import { KNOWN_CHANNELS, type ChannelId } from "@/lib/logs/channel";
import type { LogChannel } from "@/lib/logs/machine-log";
import type { UnitId } from "@/lib/units/unit-table";

/** Placing columns by name; what is worked out (places of rows, resistance, flags) is left for the reader to work out again. */
const PLACING: Record<string, { channel: ChannelId; unit: UnitId } | undefined> = {
  pass: { channel: "pass", unit: "1" },
  row: { channel: "row", unit: "1" },
  time: { channel: "time", unit: "iso8601" },
  timeS: { channel: "time", unit: "s" },
  antennaLonDeg: { channel: "longitude", unit: "deg" },
  antennaLatDeg: { channel: "latitude", unit: "deg" },
  headingDeg: { channel: "heading", unit: "deg" },
  speedMps: { channel: "speed", unit: "m/s" },
  working: { channel: "working", unit: "boolean" },
};

export interface ReadAgainInput {
  table: ReadingsTable;
  shape: ExportShape;
  channels: readonly LogChannel[];
  /** Which of its two names a column has in the file. */
  names: "name" | "shortName";
}

/** Mapping that reads an exported table of readings in again. Units that no file may have (Pa, kg/m2) are left out. */
export function readAgainMapping({ table, shape, channels, names }: ReadAgainInput): LogMapping {
  const logged = new Map(channels.map((channel) => [channel.id as string, channel]));
  const columns = table.columns.flatMap((column): MappedColumn[] => {
    const placing = PLACING[column.name];
    if (placing) return [{ name: column[names], ...placing }];
    const channel = column.channel ? logged.get(column.channel.id) : undefined;
    const unit = channel && fileUnit(channel);
    if (!channel || !unit) return [];
    const row = column.channel?.row;
    return [{ name: column[names], channel: channel.id, unit, ...(row === undefined ? {} : { row }) }];
  });
  return { columns, shape: channels.some((channel) => channel.perRow) ? shape : "single" };
}

const FILE_UNITS: readonly string[] = ["N", "m", "m/s", "s", "deg", "fraction", "boolean", "1", "1/m2", "kg/s", "kg"];

function fileUnit({ id, unit }: LogChannel): UnitId | null {
  const isKnown = (KNOWN_CHANNELS as readonly string[]).includes(id) || id.startsWith("other:");
  return isKnown && FILE_UNITS.includes(unit) ? (unit as UnitId) : null;
}
