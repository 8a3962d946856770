/** Two maps over each other with a divider, or next to each other. */
export const COMPARE_MODES = ["swipe", "side"] as const;
export type CompareMode = (typeof COMPARE_MODES)[number];

/** What the open log's channel is held against. */
export interface Comparison {
  mode: CompareMode;
  channel: string;
  /** Another log of the field; null for the same one. */
  logId: string | null;
}

export function isCompareMode(text: string | null): text is CompareMode {
  return (COMPARE_MODES as readonly (string | null)[]).includes(text);
}
