import type { Position } from "geojson";

function isPosition(value: unknown): value is Position {
  return Array.isArray(value) && typeof value[0] === "number" && typeof value[1] === "number";
}

function collect(value: unknown, lines: Position[][]): void {
  if (!Array.isArray(value)) return;
  if (value.length > 1 && value.every(isPosition)) lines.push(value);
  else for (const part of value as unknown[]) collect(part, lines);
}

/** The lines of a finding's place: stretches as they are, areas as their rings. Empty for a point or for nothing. */
export function linesOfPlace(place: unknown): Position[][] {
  const lines: Position[][] = [];
  if (typeof place !== "object" || place === null) return lines;
  if ("coordinates" in place) collect(place.coordinates, lines);
  if ("geometries" in place && Array.isArray(place.geometries)) {
    lines.push(...(place.geometries as unknown[]).flatMap(linesOfPlace));
  }
  return lines;
}

function spanOf(line: readonly Position[]): number {
  let span = 0;
  line.forEach((place, index) => {
    const before = line[index - 1];
    if (before) span += Math.hypot((place[0] ?? 0) - (before[0] ?? 0), (place[1] ?? 0) - (before[1] ?? 0));
  });
  return span;
}

/** A place in the middle of the longest stretch, between two of its corners; null where there is no stretch. */
export function middleOfPlace(place: unknown): { longitude: number; latitude: number } | null {
  const longest = linesOfPlace(place).toSorted((a, b) => spanOf(b) - spanOf(a))[0];
  if (!longest) return null;
  const at = Math.floor((longest.length - 1) / 2);
  const [from, to] = [longest[at], longest[at + 1] ?? longest[at]];
  if (!from || !to) return null;
  return {
    longitude: ((from[0] ?? NaN) + (to[0] ?? NaN)) / 2,
    latitude: ((from[1] ?? NaN) + (to[1] ?? NaN)) / 2,
  };
}
