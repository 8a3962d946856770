import { featureBatch, type FeatureColumn, type FeatureTable } from "@/lib/export/columns/feature-column";
import type { ExportBatch, LogPart } from "@/lib/export/export-table";
import type { Pass } from "@/lib/logs/placed-log";
import { buildSwaths, type SwathProperties } from "@/lib/zones/swaths";

type SwathFacts = SwathProperties & Pick<Pass, "startedAtMs" | "endedAtMs" | "records" | "headland">;
export type SwathsTable = FeatureTable<SwathFacts>;

/** One polygon a pass: the ground between its outer row edges. */
export function swathsTable(timeIsRelative: boolean): SwathsTable {
  const columns: FeatureColumn<SwathFacts>[] = [
    whole("pass", "PASS", "Number of the pass, from 1 in time order.", (swath) => swath.pass),
    number("areaM2", "AREA_M2", "m2", "Area of the polygon on the ellipsoid.", (swath) => swath.areaM2),
    number("headingDeg", "HDG_DEG", "degrees", "Mean heading, clockwise from north.", (swath) => swath.headingDeg),
    number("lengthM", "LENGTH_M", "m", "Length of the implement's path.", (swath) => swath.lengthM),
    whole("headland", "HEADLAND", "1 for a pass of the headland.", (swath) => (swath.headland ? 1 : 0)),
    whole("records", "RECORDS", "Records of the log in the pass.", (swath) => swath.records),
    ...(timeIsRelative ? [] : times()),
  ];
  return { level: "swaths", geometry: "polygon", columns };
}

/** The swath of one part of the log; none for records between passes. */
export function* swathsBatches(table: SwathsTable, { placed }: LogPart): Generator<ExportBatch> {
  const [pass] = placed.passes;
  if (!pass) return;
  const { startedAtMs, endedAtMs, records, headland } = pass;
  const features = buildSwaths(placed).features.map(({ geometry, properties }) => ({
    geometry,
    facts: { ...properties, startedAtMs, endedAtMs, records, headland },
  }));
  if (features.length > 0) yield featureBatch(table.columns, features);
}

type Read = FeatureColumn<SwathFacts>["read"];

// kernel: a heading, its short form, what it means and where it is read
function whole(name: string, shortName: string, meaning: string, read: Read): FeatureColumn<SwathFacts> {
  return { name, shortName, kind: "integer", unit: "", meaning, read };
}

// kernel: a heading, its short form, unit, meaning and where it is read
function number(name: string, shortName: string, unit: string, meaning: string, read: Read): FeatureColumn<SwathFacts> {
  return { name, shortName, kind: "number", unit, decimals: 4, meaning, read };
}

function times(): FeatureColumn<SwathFacts>[] {
  const time = { kind: "time", unit: "UTC", width: 24 } as const;
  return [
    {
      ...time,
      name: "startedAt",
      shortName: "START_UTC",
      meaning: "First record, UTC.",
      read: (swath) => swath.startedAtMs,
    },
    { ...time, name: "endedAt", shortName: "END_UTC", meaning: "Last record, UTC.", read: (swath) => swath.endedAtMs },
  ];
}
