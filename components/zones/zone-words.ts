import type { LimitZoneKind, LimitZonesBody, ZonePatch } from "@/lib/schemas/limit-zones";
import type { UnitSystem } from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

export const KIND_WORDS: Record<LimitZoneKind, string> = {
  "under-target": "Under target",
  "at-limit": "At the limit",
  "over-target": "Over target",
  "too-shallow": "Too shallow",
};

/** What a zone's hatch looks like on the map. */
export const HATCH_WORDS: Record<LimitZoneKind, string> = {
  "under-target": "lines rising to the right",
  "at-limit": "level lines",
  "over-target": "upright lines",
  "too-shallow": "crossed lines",
};

/** Kinds that a log can be asked for, by the readings of each row that it has. */
export function kindsOf(channels: readonly { id: string; perRow: boolean }[]): LimitZoneKind[] {
  const has = (id: string) => channels.some((channel) => channel.id === id && channel.perRow);
  return [
    ...(has("margin") ? (["under-target"] as const) : []),
    ...(has("downforce") ? (["at-limit"] as const) : []),
    ...(has("margin") ? (["over-target"] as const) : []),
    ...(has("depth") ? (["too-shallow"] as const) : []),
  ];
}

/** "row 7", "rows 5 to 9". */
export function sayRows({ firstRow, lastRow }: Pick<ZonePatch, "firstRow" | "lastRow">): string {
  return firstRow === lastRow ? `row ${firstRow}` : `rows ${firstRow} to ${lastRow}`;
}

/** What counts: "Margin below 350 N". */
export function sayThreshold({ kind, threshold, unit, channel }: LimitZonesBody, system: UnitSystem): string {
  const value = formatQuantity(threshold, unit, system, { channel }).text;
  if (kind === "under-target") return `margin below ${value}`;
  if (kind === "over-target") return `margin above ${value}`;
  if (kind === "at-limit") return `applied force from ${value} on`;
  return `depth below ${value}`;
}

/** What zones of a kind come to: how much ground, of what, in how many patches. */
export function sayTotals({ totals, patches, minLengthM }: LimitZonesBody, system: UnitSystem): string {
  const format = (value: number | null, unit: string) =>
    formatQuantity(value, unit, system, { channel: "distance" }).text;
  const share = (value: number | null) => formatQuantity(value, "fraction", system, { decimals: 1 }).text;
  if (patches.length === 0) {
    return `No stretch of ${format(minLengthM, "m")} or more; reading by reading ${share(totals.shareOfDistance)} of the distance.`;
  }
  const count = patches.length === 1 ? "1 patch" : `${patches.length} patches`;
  return `${format(totals.areaM2, "m2")} in ${count}: ${share(totals.shareOfWorked)} of the worked ground. Reading by reading, ${share(totals.shareOfDistance)} of the distance.`;
}
