/** Channels a log may carry under a known name; any other is `other:<name>`. */
export const KNOWN_CHANNELS = [
  "time",
  "longitude",
  "latitude",
  "easting",
  "northing",
  "heading",
  "speed",
  "working",
  "pass",
  "row",
  "downforce",
  "margin",
  "contact",
  "depth",
  "population",
  "swathWidth",
  "yieldFlow",
  "yieldMass",
  "moisture",
  "distance",
  "interval",
] as const;
export type KnownChannel = (typeof KNOWN_CHANNELS)[number];
export type ChannelId = KnownChannel | `other:${string}`;

/** Channels that place a record rather than measure something about it. */
export const PLACING_CHANNELS = [
  "time",
  "longitude",
  "latitude",
  "easting",
  "northing",
  "heading",
  "speed",
  "working",
  "pass",
  "row",
  "distance",
  "interval",
] as const satisfies readonly KnownChannel[];

/** Channels worked out from others, usable wherever a logged channel is. */
export const DERIVED_CHANNELS = ["resistance", "rowSpeed", "flags", "underTarget", "atLimit", "marginByForce"] as const;
export type DerivedChannelId = (typeof DERIVED_CHANNELS)[number] | `deviation:${string}`;
export type AnyChannelId = ChannelId | DerivedChannelId;

/** Whether a channel is worked out from others rather than logged. */
export function isDerivedChannel(channel: string): boolean {
  return channel.startsWith("deviation:") || (DERIVED_CHANNELS as readonly string[]).includes(channel);
}

const CHANNEL_PATTERN = /^(?:[a-zA-Z]+|other:[^/\\]{1,80}|deviation:(?:[a-zA-Z]+|other:[^/\\]{1,80}))$/;

export function isChannelId(text: string): text is AnyChannelId {
  if (!CHANNEL_PATTERN.test(text)) return false;
  if (text.startsWith("other:")) return true;
  if (text.startsWith("deviation:")) return isChannelId(text.slice("deviation:".length));
  return (KNOWN_CHANNELS as readonly string[]).includes(text) || (DERIVED_CHANNELS as readonly string[]).includes(text);
}
