import type { MarkState } from "@/components/ui/state-mark";
import { channelWords } from "@/lib/legend/channel-words";
import type { Share, ShareInput } from "@/lib/schemas/shares";

export const AUDIENCES: { id: ShareInput["audience"]; word: string; hint: string }[] = [
  { id: "landowner", word: "Landowner", hint: "One page in plain words, to read on a phone or print." },
  { id: "adviser", word: "Adviser", hint: "The same page, for somebody who works with you." },
  { id: "operator", word: "Operator", hint: "For whoever drives, without an account." },
  { id: "public", word: "Anyone", hint: "Could be passed on to anybody. Consider leaving the place out." },
];

export const LAYER_WORDS: Record<ShareInput["layers"][number], { word: string; hint: string }> = {
  boundary: { word: "Boundary", hint: "the outline of the field and its area" },
  verdict: { word: "Verdict", hint: "what the pass came to, in sentences" },
  coverage: { word: "Coverage", hint: "the area seeded, overlapped and missed" },
  downforce: { word: `${channelWords("downforce").name} map`, hint: "how hard each row was pushed" },
  margin: { word: `${channelWords("margin").name} map`, hint: "what was left on each gauge wheel" },
  depth: { word: `${channelWords("depth").name} map`, hint: "where the machine logged it" },
  resistance: { word: `${channelWords("resistance").name} map`, hint: "what the ground asked for" },
};

/** Layers chosen to begin with: what a landowner can read. */
export const FIRST_LAYERS: ShareInput["layers"] = ["boundary", "verdict", "coverage", "margin"];

export const LIVES: { days: number; word: string }[] = [
  { days: 7, word: "one week" },
  { days: 30, word: "30 days" },
  { days: 180, word: "half a year" },
  { days: 365, word: "one year" },
];

const DAY_MS = 86_400_000;

export function expiryAfter(days: number, now: Date): string {
  return new Date(now.getTime() + days * DAY_MS).toISOString();
}

const STATES: Record<Share["state"], { mark: MarkState; word: string }> = {
  open: { mark: "fine", word: "Open" },
  expired: { mark: "none", word: "Expired" },
  revoked: { mark: "none", word: "Withdrawn" },
};

export function describeShareState(state: Share["state"]): { mark: MarkState; word: string } {
  return STATES[state];
}
