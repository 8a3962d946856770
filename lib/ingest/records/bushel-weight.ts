import { unitFactor } from "@/lib/units/convert-unit";

/** Pounds in a bushel from a column's format, `56 lb` or `25.4 kg`; null when it says none. */
export function readBushelWeight(format: string | undefined): number | null {
  const match = /^(\d+(?:\.\d+)?)\s*(lb|lbs|kg)?(?:\s*(?:\/|per)\s*bu(?:shel)?)?$/i.exec(format?.trim() ?? "");
  if (!match) return null;
  const weight = Number(match[1]);
  const pounds = match[2]?.toLowerCase() === "kg" ? weight / unitFactor("lb") : weight;
  return pounds > 0 ? pounds : null;
}
