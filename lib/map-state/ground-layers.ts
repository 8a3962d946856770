/** What of the ground a map may show over the readings. */
export const GROUND_LAYERS = ["swaths", "overlap", "skips"] as const;
export type GroundLayer = (typeof GROUND_LAYERS)[number];

export function isGroundLayer(text: string): text is GroundLayer {
  return (GROUND_LAYERS as readonly string[]).includes(text);
}

/** Shows what is hidden and hides what is shown; the order stays that of the list. */
export function toggleGroundLayer(shown: readonly GroundLayer[], layer: GroundLayer): GroundLayer[] {
  return GROUND_LAYERS.filter((name) => shown.includes(name) !== (name === layer));
}
