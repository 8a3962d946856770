import { resolveChannel } from "@/lib/channels/resolve-channel";
import { leftOutOfRecordColumn } from "@/lib/export/columns/left-out-column";
import { makeNamesUnique } from "@/lib/export/columns/make-names-unique";
import { channelColumn } from "@/lib/export/columns/name-channel-column";
import {
  antennaColumns,
  channelIds,
  flagsColumn,
  motionColumns,
  recordColumns,
  timeColumn,
  workingColumn,
  type ReadingColumn,
  type ReadingsTable,
} from "@/lib/export/columns/readings-table";
import type { LogPart } from "@/lib/export/export-table";
import type { PlacedLog } from "@/lib/logs/placed-log";

/**
 * One row a record, the rows of the machine side by side (`marginN_7`). The place is where the
 * machine's centre line met the line of rows.
 */
export function wideReadingsTable(outline: PlacedLog): ReadingsTable {
  const columns = [
    ...recordColumns(outline),
    timeColumn(outline.log.timeIsRelative),
    ...middlePlaceColumns(),
    ...motionColumns(),
    workingColumn(),
    flagsColumn(),
    ...(outline.leftOut ? [leftOutOfRecordColumn()] : []),
    ...antennaColumns(),
    ...channelIds(outline).flatMap((id) => channelColumns(id, outline)),
  ];
  return { level: "readings", geometry: "none", columns: makeNamesUnique(columns), rowsARecord: 1 };
}

function middlePlaceColumns(): ReadingColumn[] {
  const shared = { kind: "number", unit: "degrees", decimals: 8 } as const;
  const toolbar =
    (axis: 0 | 1) =>
    ({ placed }: LogPart) =>
    (record: number) => {
      const [eastM, northM] = [placed.originEastM[record]!, placed.originNorthM[record]!];
      return Number.isFinite(eastM) ? placed.plane.toDegrees(eastM, northM)[axis] : NaN;
    };
  return [
    {
      ...shared,
      name: "lonDeg",
      shortName: "LON_DEG",
      meaning: "Longitude of the middle of the line of rows, WGS 84.",
      prepare: toolbar(0),
    },
    {
      ...shared,
      name: "latDeg",
      shortName: "LAT_DEG",
      meaning: "Latitude of the middle of the line of rows, WGS 84.",
      prepare: toolbar(1),
    },
  ];
}

function channelColumns(id: string, outline: PlacedLog): ReadingColumn[] {
  const known = resolveChannel(outline, id);
  if (!known) return [];
  const column = channelColumn(id, known.unit);
  const places = known.perRow ? Array.from({ length: known.rows }, (_, index) => index) : [0];
  return places.map((place) => ({
    ...column,
    channel: known.perRow ? { id, row: place + 1 } : { id },
    name: known.perRow ? `${column.name}_${place + 1}` : column.name,
    meaning: known.perRow ? `Row ${place + 1}. ${column.meaning}` : column.meaning,
    prepare: ({ placed }) => {
      const channel = resolveChannel(placed, id);
      return (record) => channel?.values[record * channel.rows + place] ?? NaN;
    },
  }));
}
