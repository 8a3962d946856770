import { resolveChannelOrReason, type ResolvedChannel } from "@/lib/channels/resolve-channel";
import { AppError } from "@/lib/errors";
import { featureBatch, type FeatureColumn, type FeatureTable } from "@/lib/export/columns/feature-column";
import { unitEnding, unitWords } from "@/lib/export/columns/name-channel-column";
import { BATCH_ROWS, type ExportBatch, type LogPart } from "@/lib/export/export-table";
import { categoriesOf } from "@/lib/legend/categories";
import { classOf } from "@/lib/legend/class-edges";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { buildZones, DEFAULT_ZONE_LENGTH_M, type ZoneProperties } from "@/lib/zones/zones";

export interface ZonesChoice {
  channel: string;
  /** Class edges in the channel's SI unit, any order. */
  breaks: readonly number[];
  minLengthM?: number;
}

export interface ZonesTable extends FeatureTable<ZoneProperties> {
  choice: { channel: string; breaks: readonly number[]; minLengthM: number };
}

/**
 * One polygon a stretch of one row in one class. @throws AppError unprocessable where the log cannot give the channel, or
 * has it only for the whole machine
 */
export function zonesTable(outline: PlacedLog, chosen: ZonesChoice): ZonesTable {
  const resolved = resolveChannelOrReason(outline, chosen.channel);
  if (!resolved.ok) throw new AppError("unprocessable", resolved.error, { detailCode: "channel_not_available" });
  const breaks = [...chosen.breaks].sort((a, b) => a - b);
  const choice = { channel: chosen.channel, breaks, minLengthM: chosen.minLengthM ?? DEFAULT_ZONE_LENGTH_M };
  // Asked of no records: only the refusal of a channel without rows matters here.
  buildZones({ ...outline, passes: [] }, choice.channel, choice);
  return { level: "zones", geometry: "polygon", columns: zoneColumns(resolved.value, breaks), choice };
}

/** The zones of one part of the log. */
export function* zonesBatches(table: ZonesTable, part: LogPart): Generator<ExportBatch> {
  const { channel, ...options } = table.choice;
  const { features } = buildZones(part.placed, channel, options);
  const laterS = secondsAfterStart(part);
  for (let from = 0; from < features.length; from += BATCH_ROWS) {
    const some = features.slice(from, from + BATCH_ROWS).map(({ geometry, properties }) => ({
      geometry,
      facts: { ...properties, startS: add(properties.startS, laterS), endS: add(properties.endS, laterS) },
    }));
    yield featureBatch(table.columns, some);
  }
}

/** A part counts its seconds from its own first time. */
function secondsAfterStart({ placed, logStartMs }: LogPart): number {
  const firstMs = placed.log.timeMs.find((time) => Number.isFinite(time)) ?? NaN;
  return (firstMs - logStartMs) / 1000;
}

function add(seconds: number | null, laterS: number): number | null {
  return seconds === null ? null : seconds + laterS;
}

type ZoneColumn = FeatureColumn<ZoneProperties>;

function zoneColumns(
  { id, unit: siUnit, isCode }: Pick<ResolvedChannel, "id" | "unit" | "isCode">,
  breaks: readonly number[],
): ZoneColumn[] {
  const ending = unitEnding(siUnit);
  const unit = unitWords(siUnit);
  const short = ending.length <= 3 && ending !== "" ? `_${ending.toUpperCase()}` : "";
  const value = (name: string, meaning: string, read: ZoneColumn["read"]): ZoneColumn => ({
    name: name + ending,
    shortName: name.toUpperCase().slice(0, 10 - short.length) + short,
    kind: "number",
    unit,
    meaning,
    read,
  });
  const whole = (name: string, shortName: string, meaning: string, read: ZoneColumn["read"]): ZoneColumn => {
    return { name, shortName, kind: "integer", unit: "", meaning, read };
  };
  return [
    whole("pass", "PASS", "Number of the pass, from 1 in time order.", (zone) => zone.pass),
    whole("row", "ROW", "Number of the row, 1 leftmost looking forward.", (zone) => zone.row),
    whole("class", "CLASS", "Class of the stretch; 0 below the first edge.", (zone) => zone.class),
    ...(categoriesOf(id) ? [nameColumn(id, breaks)] : []),
    value("from", "Lower edge of the class; empty for the lowest.", (zone) => breaks[zone.class - 1] ?? null),
    value("to", "Upper edge of the class; empty for the highest.", (zone) => breaks[zone.class] ?? null),
    ...(isCode
      ? []
      : [
          value("mean", "Mean of the raw readings, weighted by distance.", (zone) => zone.mean),
          value("min", "Smallest raw reading.", (zone) => zone.min),
          value("max", "Largest raw reading.", (zone) => zone.max),
        ]),
    whole("readings", "READINGS", "Number of raw readings.", (zone) => zone.n),
    {
      ...measure("areaM2", "AREA_M2", "m2", "Distance travelled by the row times its width."),
      read: (zone) => zone.areaM2,
    },
    { ...measure("startS", "START_S", "s", "Start, seconds since the log's first time."), read: (zone) => zone.startS },
    { ...measure("endS", "END_S", "s", "End, seconds since the log's first time."), read: (zone) => zone.endS },
  ];
}

/** What a class is called, where its edges hold a single name. */
function nameColumn(channel: string, breaks: readonly number[]): ZoneColumn {
  const names = categoriesOf(channel) ?? [];
  return {
    name: "name",
    shortName: "NAME",
    kind: "text",
    unit: "",
    width: Math.max(1, ...names.map(({ name }) => name.length)),
    meaning: "Name of the class; empty where its edges hold several.",
    read: (zone) => {
      const within = names.filter(({ code }) => classOf(code, breaks) === zone.class);
      return within.length === 1 ? within[0]!.name : null;
    },
  };
}

// kernel: a heading, its short form, unit and meaning
function measure(name: string, shortName: string, unit: string, meaning: string) {
  return { name, shortName, kind: "number", unit, meaning, decimals: 4 } as const;
}
