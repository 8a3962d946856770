import type { ChannelId, KnownChannel } from "@/lib/logs/channel";
import { getUnit, UNIT_IDS, type Quantity, type UnitId } from "@/lib/units/unit-table";

interface ChannelMeaning {
  /** What its unit may measure. */
  quantities: readonly Quantity[];
  /** As said in a sentence: "is the downforce of row 7". */
  words: string;
  /** May have one value a row unit. */
  rowable: boolean;
}

/** Every known channel: what it may be measured in and how it is said. */
export const CHANNEL_MEANINGS: Record<KnownChannel, ChannelMeaning> = {
  time: { quantities: ["clock", "duration"], words: "time", rowable: false },
  longitude: { quantities: ["angle"], words: "longitude", rowable: false },
  latitude: { quantities: ["angle"], words: "latitude", rowable: false },
  easting: { quantities: ["length"], words: "easting", rowable: false },
  northing: { quantities: ["length"], words: "northing", rowable: false },
  heading: { quantities: ["angle"], words: "heading", rowable: false },
  speed: { quantities: ["speed"], words: "ground speed", rowable: false },
  working: { quantities: ["switch"], words: "working state", rowable: true },
  pass: { quantities: ["number"], words: "pass number", rowable: false },
  row: { quantities: ["number"], words: "row number", rowable: false },
  // A pressure stays a pressure: it is kept in Pa and never shown as a force.
  downforce: { quantities: ["force", "pressure"], words: "downforce", rowable: true },
  margin: { quantities: ["force", "pressure"], words: "margin (load left on the gauge wheel)", rowable: true },
  contact: { quantities: ["share"], words: "ground contact", rowable: true },
  depth: { quantities: ["length"], words: "seeding depth", rowable: true },
  population: { quantities: ["arealCount"], words: "population", rowable: true },
  swathWidth: { quantities: ["length"], words: "swath width", rowable: false },
  yieldFlow: { quantities: ["massFlow"], words: "grain flow", rowable: true },
  yieldMass: { quantities: ["mass", "arealMass"], words: "yield", rowable: true },
  moisture: { quantities: ["share"], words: "grain moisture", rowable: true },
  distance: { quantities: ["length"], words: "distance", rowable: false },
  interval: { quantities: ["duration"], words: "time between records", rowable: false },
};

function getMeaning(channel: ChannelId): ChannelMeaning | null {
  return channel.startsWith("other:") ? null : CHANNEL_MEANINGS[channel as KnownChannel];
}

/** "downforce", or the person's own name of an `other:` channel. */
export function channelWords(channel: ChannelId): string {
  return getMeaning(channel)?.words ?? channel.slice("other:".length);
}

export function isRowable(channel: ChannelId): boolean {
  return getMeaning(channel)?.rowable ?? true;
}

/** Units a column of this channel may be in, in table order; any but clocks for an `other:` channel. */
export function unitsForChannel(channel: ChannelId): UnitId[] {
  const meaning = getMeaning(channel);
  return UNIT_IDS.filter((id) => {
    const { quantity } = getUnit(id);
    return meaning ? meaning.quantities.includes(quantity) : quantity !== "clock";
  });
}
