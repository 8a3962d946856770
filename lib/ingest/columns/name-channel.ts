import { OTHER_LANGUAGES } from "@/lib/ingest/columns/other-languages";
import type { ChannelId, KnownChannel } from "@/lib/logs/channel";

interface NameRule {
  channel: ChannelId;
  /** All words of one of these must be among the header's words, joined or apart. */
  words: readonly string[];
  /** How surely the words alone mean the channel. */
  weight: number;
}

/** Words of headers, most telling first: the first rule that fits is taken. Words of the trade only. */
const ENGLISH: readonly NameRule[] = [
  // Ours, of a file whose records are areas.
  { channel: "other:area of its shape", words: ["area of its shape"], weight: 0.95 },
  { channel: "longitude", words: ["longitude", "lon", "long", "lng"], weight: 0.95 },
  { channel: "latitude", words: ["latitude", "lat"], weight: 0.95 },
  { channel: "easting", words: ["easting", "east", "utm e", "utm x", "point x"], weight: 0.9 },
  { channel: "northing", words: ["northing", "north", "utm n", "utm y", "point y"], weight: 0.9 },
  { channel: "heading", words: ["heading", "course", "cog", "bearing", "azimuth", "hdg"], weight: 0.9 },
  { channel: "speed", words: ["speed", "velocity", "sog", "spd", "vel"], weight: 0.9 },
  {
    channel: "margin",
    words: [
      "margin",
      "gauge wheel",
      "gaugewheel",
      "wheel load",
      "wheelload",
      "gwload",
      "gw load",
      "gw",
      "gauge load",
      "mg",
    ],
    weight: 0.9,
  },
  { channel: "contact", words: ["ground contact", "contact", "groundcontact", "gc"], weight: 0.9 },
  {
    channel: "downforce",
    words: ["downforce", "down force", "df", "applied force", "down pressure", "downpressure", "force"],
    weight: 0.9,
  },
  { channel: "depth", words: ["depth", "dpth", "dp"], weight: 0.9 },
  {
    channel: "population",
    words: ["population", "pop", "seed rate", "seeding rate", "seedrate", "seed count", "seeds", "stand", "plants"],
    weight: 0.85,
  },
  { channel: "moisture", words: ["moisture", "moist", "mst"], weight: 0.85 },
  {
    channel: "yieldFlow",
    words: ["mass flow", "grain flow", "yield flow", "massflow", "flow", "flow rate"],
    weight: 0.85,
  },
  { channel: "yieldMass", words: ["yield", "yld", "grain mass", "yield mass", "harvested mass"], weight: 0.8 },
  {
    channel: "swathWidth",
    words: ["swath width", "swathwidth", "working width", "cut width", "width", "swath"],
    weight: 0.8,
  },
  { channel: "interval", words: ["interval", "duration", "time step", "dt"], weight: 0.8 },
  {
    channel: "time",
    words: [
      "timestamp",
      "gps week",
      "week number",
      "time of week",
      "seconds of week",
      "gps seconds",
      "tow",
      "time",
      "datetime",
      "date time",
      "date",
      "utc",
      "epoch",
      "clock",
      "gps time",
      "t",
    ],
    weight: 0.9,
  },
  { channel: "distance", words: ["distance", "dist"], weight: 0.8 },
  {
    channel: "working",
    words: ["working", "work state", "workstate", "work", "engaged", "implement state", "lowered", "section", "on off"],
    weight: 0.8,
  },
  { channel: "pass", words: ["pass number", "pass no", "pass"], weight: 0.85 },
  { channel: "row", words: ["row number", "row no", "row unit", "row", "opener", "unit number"], weight: 0.85 },
  // German for length and width too, so a person looks.
  { channel: "longitude", words: ["lange", "laenge"], weight: 0.5 },
  { channel: "latitude", words: ["breite"], weight: 0.5 },
  { channel: "longitude", words: ["x"], weight: 0.5 },
  { channel: "latitude", words: ["y"], weight: 0.5 },
  { channel: "margin", words: ["load"], weight: 0.5 },
];

/** The first rule of a channel knows the other languages' words for it. */
const RULES: readonly NameRule[] = ENGLISH.map((rule) => {
  const isFirst = ENGLISH.find(({ channel }) => channel === rule.channel) === rule;
  const others = isFirst ? (OTHER_LANGUAGES[rule.channel as KnownChannel] ?? []) : [];
  return { ...rule, words: [...rule.words, ...others] };
});

export interface NamedChannel {
  channel: ChannelId;
  weight: number;
  /** The words that told. */
  words: string;
}

/** The channel that a header's words name; null when none. Words that stand beside others count a little less. */
export function nameChannel(tokens: readonly string[]): NamedChannel | null {
  const text = ` ${tokens.join(" ")} `;
  for (const rule of RULES) {
    const words = rule.words.find((phrase) => text.includes(` ${phrase} `));
    if (words === undefined) continue;
    const extra = tokens.length - words.split(" ").length;
    return { channel: rule.channel, weight: rule.weight - Math.min(0.2, extra * 0.05), words };
  }
  return null;
}
