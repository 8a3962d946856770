import { PLACING_CHANNELS } from "@/lib/logs/channel";

/** Channels that are looked at without being asked for. */
const MAIN_CHANNELS = ["downforce", "margin", "depth", "contact", "yieldFlow", "moisture"];
/** Logged, but not a reading of the ground. */
const NOT_MEASURED: readonly string[] = [...PLACING_CHANNELS, "swathWidth"];
const DERIVED = /^(resistance|rowSpeed|flags|deviation:.*)$/;

/** Those of a log's channels whose delay can be asked for. */
export function delayChannels(ids: readonly string[]): string[] {
  return ids.filter((id) => !NOT_MEASURED.includes(id) && !DERIVED.test(id));
}

/** Those of them that every log is looked at for. */
export function mainDelayChannels(ids: readonly string[]): string[] {
  return delayChannels(ids).filter((id) => MAIN_CHANNELS.includes(id));
}
