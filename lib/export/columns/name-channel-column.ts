import { channelWords } from "@/lib/legend/channel-words";
import type { SiUnit } from "@/lib/logs/machine-log";
import type { ExportColumn } from "@/lib/export/export-table";

/** How a unit ends a column's name, and what it is called. */
const UNIT_ENDINGS: Record<SiUnit, { ending: string; words: string }> = {
  N: { ending: "N", words: "N" },
  m: { ending: "M", words: "m" },
  m2: { ending: "M2", words: "m2" },
  "m/s": { ending: "Mps", words: "m/s" },
  s: { ending: "S", words: "s" },
  deg: { ending: "Deg", words: "degrees" },
  fraction: { ending: "Fraction", words: "fraction, 0 to 1" },
  boolean: { ending: "", words: "0 or 1" },
  "1": { ending: "", words: "" },
  "1/m2": { ending: "PerM2", words: "1/m2" },
  "kg/m2": { ending: "KgPerM2", words: "kg/m2" },
  "kg/s": { ending: "KgPerS", words: "kg/s" },
  kg: { ending: "Kg", words: "kg" },
  Pa: { ending: "Pa", words: "Pa" },
};

export function unitEnding(unit: string): string {
  return UNIT_ENDINGS[unit as SiUnit]?.ending ?? "";
}

export function unitWords(unit: string): string {
  return UNIT_ENDINGS[unit as SiUnit]?.words ?? unit;
}

const SHORT: Record<string, string | undefined> = {
  downforce: "DF",
  margin: "MARGIN",
  contact: "CONTACT",
  depth: "DEPTH",
  population: "POP",
  resistance: "RESIST",
  swathWidth: "WIDTH",
  yieldFlow: "FLOW",
  yieldMass: "YIELD",
  moisture: "MOIST",
};

/** `other:Hydraulic flow` as `otherHydraulicFlow`: letters and digits only, so that no name is read as a formula or as SQL. */
function camelWords(channel: string): string {
  const words = channel.split(/[^\p{L}\p{N}]+/u).filter((word) => word !== "");
  const joined = words.map((word, i) => (i === 0 ? word : word[0]!.toUpperCase() + word.slice(1))).join("");
  return /^\p{L}/u.test(joined) ? joined : `channel${joined}`;
}

/** Ten capitals, digits or underscores at most: the name, then the unit where it fits. */
function shortChannelName(channel: string, unit: string): string {
  const words =
    SHORT[channel] ??
    channel
      .replace(/^other:/, "")
      .toUpperCase()
      .replaceAll(/[^A-Z0-9]+/g, "_");
  const ending = unitEnding(unit).toUpperCase();
  const name = words.replaceAll(/^[_0-9]+|_+$/g, "") || "CHANNEL";
  if (ending === "" || ending.length > 5) return name.slice(0, 10);
  return `${name.slice(0, 9 - ending.length)}_${ending}`;
}

/** The column of a channel: its name with the unit at the end, and what it says. */
export function channelColumn(channel: string, unit: string): ExportColumn {
  return {
    name: camelWords(channel) + unitEnding(unit),
    shortName: shortChannelName(channel, unit),
    kind: "float32",
    unit: unitWords(unit),
    meaning:
      channelWords(channel).meaning === "As named in the file."
        ? `"${channelWords(channel).name}", as named in the file.`
        : channelWords(channel).meaning,
  };
}
