import { distanceToBoundary } from "@/lib/geo/distance-to-boundary";
import type { MachineLog } from "@/lib/logs/machine-log";
import type { Boundary } from "@/lib/schemas/geometry";
import { median } from "@/lib/statistics/median";

/** A record counts as elsewhere beyond this from its field: boundaries are drawn roughly, and a drill turns outside them. */
const ELSEWHERE_M = 100;
/** Records looked at, spread evenly over the log. */
const LOOKED_AT = 2000;

export interface KnownField {
  id: string;
  boundary: Boundary;
}

export interface LiesElsewhere {
  /** Share of the records within the field, 0..1. */
  shareInside: number;
  /** Share more than 100 m outside it. */
  shareElsewhere: number;
  /** Median distance to the field of the records elsewhere. */
  distanceM: number;
}

type Place = readonly [longitude: number, latitude: number];

/** Places of a log, at most `LOOKED_AT` of them, spread evenly over its records. */
export function samplePlaces(log: Pick<MachineLog, "records" | "longitude" | "latitude">): Place[] {
  const step = Math.max(1, Math.ceil(log.records / LOOKED_AT));
  const places: Place[] = [];
  for (let i = 0; i < log.records; i += step) {
    const place = [log.longitude[i]!, log.latitude[i]!] as const;
    if (place.every(Number.isFinite) && (place[0] !== 0 || place[1] !== 0)) places.push(place);
  }
  return places;
}

/** Tells a log whose records lie mostly (more than half of them, by more than 100 m) outside its field; null where they do not. */
export function liesElsewhere(places: readonly Place[], boundary: Boundary): LiesElsewhere | null {
  const distanceTo = distanceToBoundary(boundary);
  const distances = places.map((place) => distanceTo(...place));
  const elsewhere = distances.filter((distance) => distance > ELSEWHERE_M);
  if (elsewhere.length * 2 <= places.length || places.length === 0) return null;
  return {
    shareInside: distances.filter((distance) => distance === 0).length / places.length,
    shareElsewhere: elsewhere.length / places.length,
    distanceM: median(elsewhere),
  };
}

/** Of the fields, the one whose boundary holds most of the places, if it holds more than half of them. */
export function findHoldingField(places: readonly Place[], fields: readonly KnownField[]): string | null {
  let best: { id: string; held: number } | null = null;
  for (const { id, boundary } of fields) {
    const distanceTo = distanceToBoundary(boundary);
    // A few places tell most fields apart without a look at all of them.
    if (!places.some((place, i) => i % 50 === 0 && distanceTo(...place) === 0)) continue;
    const held = places.filter((place) => distanceTo(...place) === 0).length;
    if (held * 2 > places.length && held > (best?.held ?? 0)) best = { id, held };
  }
  return best?.id ?? null;
}

/** "None of these records lie in Mill bottom: they lie 3.1 km away." */
export function sayElsewhere(fieldName: string, { shareInside, distanceM }: LiesElsewhere): string {
  const percent = Math.round(shareInside * 100);
  const away = `${sayDistance(distanceM)} away`;
  if (shareInside === 0) return `None of these records lie in ${fieldName}: they lie ${away}.`;
  return `Only ${Math.max(1, percent)} % of these records lie in ${fieldName}: most lie ${away}.`;
}

function sayDistance(metres: number): string {
  if (metres < 1000) return `${Math.round(metres / 10) * 10} m`;
  return `${metres < 100_000 ? (metres / 1000).toFixed(1) : Math.round(metres / 1000)} km`;
}
