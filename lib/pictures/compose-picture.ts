import { escapeXml, estimateWidthPx, svgNumber, textLine, wrapWords } from "@/lib/pictures/svg-text";

export interface LegendEntry {
  /** Null for the hatch of ground without readings. */
  colour: string | null;
  label: string;
}

/** The drawn part of a picture: SVG elements in its own pixels. */
export interface PictureBody {
  svg: string;
  widthPx: number;
  heightPx: number;
}

export interface PictureParts {
  title: string;
  subtitle: string;
  /** Where it comes from and when it was made. */
  source: string;
  body: PictureBody;
  /** Meaning of the colours; left out where the body says it itself. */
  legend: readonly LegendEntry[];
  /** `@font-face` rules with the font in them; empty leaves it to the reader's fonts. */
  fontCss: string;
}

const MARGIN_PX = 24;
/** Narrower than this a title cannot be read. */
const LEAST_WIDTH_PX = 320;
const INK = "#1E2430";
const INK_SOFT = "#4A5261";

/** The hatch of "nothing here", as on the screen. */
export const HATCH_DEFINITION =
  `<pattern id="hatch" width="6" height="6" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">` +
  `<rect width="1" height="6" fill="#C9C3B2"/></pattern>`;

/**
 * One SVG document: title with unit, what of the log is shown, the figure, the classes with their numbers (which read in
 * grey too), and the line of source and date. Nothing in it points outside the file.
 */
export function composePicture(parts: PictureParts): { svg: string; widthPx: number; heightPx: number } {
  const widthPx = Math.max(LEAST_WIDTH_PX, parts.body.widthPx);
  const elements: string[] = [];
  let y = MARGIN_PX;
  const write = (text: string, look: { sizePx: number; linePx: number; colour: string; isBold?: boolean }) => {
    for (const line of text ? wrapWords(text, widthPx, look.sizePx) : []) {
      y += look.linePx;
      elements.push(textLine(line, { x: MARGIN_PX, y: y - look.linePx * 0.25 }, look));
    }
  };
  write(parts.title, { sizePx: 20, linePx: 26, colour: INK, isBold: true });
  write(parts.subtitle, { sizePx: 13, linePx: 18, colour: INK_SOFT });
  y += 10;
  elements.push(`<g transform="translate(${MARGIN_PX} ${svgNumber(y)})">${parts.body.svg}</g>`);
  y += parts.body.heightPx + 10;
  const legend = drawLegend(parts.legend, widthPx);
  elements.push(`<g transform="translate(${MARGIN_PX} ${svgNumber(y)})">${legend.svg}</g>`);
  y += legend.heightPx;
  write(parts.source, { sizePx: 11, linePx: 15, colour: INK_SOFT });
  const size = { widthPx: widthPx + 2 * MARGIN_PX, heightPx: Math.ceil(y + MARGIN_PX / 2) };
  const font = parts.fontCss ? `<style>${parts.fontCss}</style>` : "";
  const svg =
    `<svg xmlns="http://www.w3.org/2000/svg" width="${svgNumber(size.widthPx)}" height="${size.heightPx}" ` +
    `viewBox="0 0 ${svgNumber(size.widthPx)} ${size.heightPx}" font-family="'Roboto Flex', system-ui, sans-serif" role="img">` +
    `<title>${escapeXml(parts.title)}</title><desc>${escapeXml(`${parts.subtitle} ${parts.source}`)}</desc>` +
    `<defs>${font}${HATCH_DEFINITION}</defs><rect width="100%" height="100%" fill="#FFFFFF"/>${elements.join("")}</svg>`;
  return { svg, ...size };
}

const SWATCH = { width: 24, height: 14, gap: 6, between: 18, line: 22 } as const;

/** Swatches with the range of each class beside it, in as many lines as it takes. */
function drawLegend(entries: readonly LegendEntry[], widthPx: number): { svg: string; heightPx: number } {
  if (entries.length === 0) return { svg: "", heightPx: 0 };
  let [x, y] = [0, 0];
  const drawn = entries.map(({ colour, label }) => {
    const wide = SWATCH.width + SWATCH.gap + estimateWidthPx(label, 12) + SWATCH.between;
    if (x > 0 && x + wide - SWATCH.between > widthPx) [x, y] = [0, y + SWATCH.line];
    const box = `x="${svgNumber(x)}" y="${y}" width="${SWATCH.width}" height="${SWATCH.height}"`;
    const swatch = `<rect ${box} fill="${colour ?? "url(#hatch)"}" stroke="${INK}" stroke-opacity="0.4"/>`;
    const words = textLine(label, { x: x + SWATCH.width + SWATCH.gap, y: y + 11 }, { sizePx: 12, colour: INK });
    x += wide;
    return swatch + words;
  });
  return { svg: drawn.join(""), heightPx: y + SWATCH.line + 4 };
}
