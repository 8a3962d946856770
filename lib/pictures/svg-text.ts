/** Text as it may stand in an SVG file. */
export function escapeXml(text: string): string {
  const plain = text
    .replaceAll("&", "&amp;")
    .replaceAll("<", "&lt;")
    .replaceAll(">", "&gt;")
    .replaceAll('"', "&quot;")
    .replaceAll("'", "&#39;");
  // XML 1.0 has no way to write these, so a name that holds one would spoil the whole file.
  return plain.replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]/g, "\ufffd");
}

/** A number for an attribute: two decimals are a fiftieth of a pixel. */
export function svgNumber(value: number): string {
  return String(Math.round(value * 100) / 100);
}

export interface TextStyle {
  sizePx: number;
  colour: string;
  isBold?: boolean;
}

/** One line of text, its baseline at `y`. */
export function textLine(text: string, at: { x: number; y: number }, { sizePx, colour, isBold }: TextStyle): string {
  const weight = isBold ? ` font-weight="600"` : "";
  const place = `x="${svgNumber(at.x)}" y="${svgNumber(at.y)}"`;
  return `<text ${place} font-size="${sizePx}"${weight} fill="${colour}">${escapeXml(text)}</text>`;
}

/** Mean width of a letter by its height, in Roboto Flex; on the wide side, so that lines end before the edge. */
const LETTER_SHARE = 0.55;

/** How wide a text is about to be. */
export function estimateWidthPx(text: string, sizePx: number): number {
  return text.length * sizePx * LETTER_SHARE;
}

/** Cuts a text into lines no wider than `widthPx`, between words; a word longer than a line gets one of its own. */
export function wrapWords(text: string, widthPx: number, sizePx: number): string[] {
  const lines: string[] = [];
  for (const word of text.split(" ")) {
    const last = lines.at(-1);
    if (last !== undefined && estimateWidthPx(`${last} ${word}`, sizePx) <= widthPx) {
      lines[lines.length - 1] = `${last} ${word}`;
    } else lines.push(word);
  }
  return lines;
}
