import type { ValueScale } from "@/lib/tiles/value-scale";

/** The code of the first step of a scale that lies at or above a value. A thousandth of a step forgives single precision. */
function firstCodeAtOrAbove(value: number, { offset, step }: ValueScale): number {
  return Math.ceil((value - offset) / step - 1e-3);
}

/**
 * Code and colour pairs, rising, for a linear interpolation that draws flat classes: the two ends of each class carry its
 * colour, and the next class begins one code further on, so nothing lies between. Code 0 (nothing logged) is transparent.
 * @param edges inner class edges in the channel's unit, rising; `colours` one more than edges.
 */
export function colourStops(
  edges: readonly number[],
  colours: readonly string[],
  scale: ValueScale,
): [code: number, colour: string][] {
  const starts: [number, string][] = [[1, colours[0] ?? "transparent"]];
  edges.forEach((edge, i) => {
    const code = firstCodeAtOrAbove(edge, scale);
    const colour = colours[i + 1] ?? "transparent";
    const last = starts[starts.length - 1]!;
    // An edge below the scale, or within the same step as the one before, leaves the class under it without a code.
    if (code <= last[0]) last[1] = colour;
    else if (code <= 65535) starts.push([code, colour]);
  });
  const stops: [number, string][] = [[0, "rgba(0, 0, 0, 0)"]];
  starts.forEach(([start, colour], i) => {
    const end = (starts[i + 1]?.[0] ?? 65536) - 1;
    stops.push([start, colour]);
    if (end > start) stops.push([end, colour]);
  });
  return stops;
}
