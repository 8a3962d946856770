import { chosenRules, defaultRules } from "@/lib/cleaning/default-rules";
import type { CleaningRules } from "@/lib/cleaning/rule-catalogue";
import type { ChannelId } from "@/lib/logs/channel";

/** How a log is read without touching it: moments put right, and readings left out. */
export interface Adjustments {
  /** How much later than it happened each channel was logged; channels left out are taken as they are. */
  delaysS: Partial<Record<ChannelId, number>>;
  cleaning: CleaningRules;
}

/** As read: revision 0 of every log. */
export function noAdjustments(): Adjustments {
  return { delaysS: {}, cleaning: defaultRules() };
}

/** True where they change no reading of any log. */
export function isAsRead({ delaysS, cleaning }: Adjustments): boolean {
  return chosenRules(cleaning).length === 0 && Object.values(delaysS).every((delay) => !delay);
}
