import { LIMIT_ZONE_KINDS, type LimitZoneKind } from "@/lib/schemas/limit-zones";

/** What of the ground a map may show over the readings: where the machine went, and zones of rows past a limit. */
export const GROUND_LAYERS = ["swaths", "overlap", "skips", ...LIMIT_ZONE_KINDS] as const;
export type GroundLayer = (typeof GROUND_LAYERS)[number];

export function isGroundLayer(text: string): text is GroundLayer {
  return (GROUND_LAYERS as readonly string[]).includes(text);
}

/** The zones among the layers shown. */
export function zonesAmong(layers: readonly GroundLayer[]): LimitZoneKind[] {
  return LIMIT_ZONE_KINDS.filter((kind) => layers.includes(kind));
}

/** Shows what is hidden and hides what is shown; the order stays that of the list. */
export function toggleGroundLayer(shown: readonly GroundLayer[], layer: GroundLayer): GroundLayer[] {
  return GROUND_LAYERS.filter((name) => shown.includes(name) !== (name === layer));
}
