export type Rgb = [red: number, green: number, blue: number];

/** Reads `#rrggbb` or `rgb(r, g, b)`. Throws a RangeError naming any other text. */
export function parseColour(text: string): Rgb {
  const hex = /^#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/i.exec(text);
  if (hex) return [parseInt(hex[1]!, 16), parseInt(hex[2]!, 16), parseInt(hex[3]!, 16)];
  const rgb = /^rgb\(\s*(\d+),\s*(\d+),\s*(\d+)\s*\)$/.exec(text);
  if (rgb) return [Number(rgb[1]), Number(rgb[2]), Number(rgb[3])];
  throw new RangeError(`parseColour reads #rrggbb and rgb(r, g, b), got "${text}"`);
}

/** `#rrggbb`. */
export function formatColour(colour: Rgb): string {
  return `#${colour.map((byte) => byte.toString(16).padStart(2, "0")).join("")}`;
}
