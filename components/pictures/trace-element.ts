import { readColour } from "@/components/pictures/read-colour";
import { traceSvg } from "@/components/pictures/trace-svg";
import type { PictureBody } from "@/lib/pictures/compose-picture";
import { escapeXml, svgNumber } from "@/lib/pictures/svg-text";

/** Where the baseline of Roboto Flex lies in the height of a line of it (ascent 0.927, descent 0.244 of the size). */
const BASELINE_SHARE = 0.79;

interface Origin {
  left: number;
  top: number;
}

/** Not part of a picture: what is pressed rather than read, and what is only heard. */
const LEFT_OUT = ".no-print, .sr-only, [data-picture='skip'], script, style";

/**
 * What an element shows, as SVG: grounds and borders of boxes, canvases as images, charts with their styles written out,
 * text as text. Covers what our charts are made of, not all of HTML: no shadows, no turned boxes, no clipping.
 */
export function traceElement(root: HTMLElement): PictureBody {
  const box = root.getBoundingClientRect();
  const origin = { left: box.left, top: box.top };
  return { svg: traceNode(root, origin), widthPx: box.width, heightPx: box.height };
}

function traceNode(node: Node, origin: Origin): string {
  if (node.nodeType === Node.TEXT_NODE) return traceText(node as Text, origin);
  if (!(node instanceof Element) || node.matches(LEFT_OUT)) return "";
  const style = getComputedStyle(node);
  if (style.display === "none" || style.visibility === "hidden" || style.opacity === "0") return "";
  if (node instanceof SVGSVGElement) return traceSvg(node, origin);
  const inside = node instanceof HTMLCanvasElement ? traceCanvas(node, origin) : traceChildren(node, origin);
  const own = traceBox(node, style, origin) + inside;
  return own && style.opacity !== "" && style.opacity !== "1" ? `<g opacity="${style.opacity}">${own}</g>` : own;
}

function traceChildren(element: Element, origin: Origin): string {
  if (element instanceof HTMLInputElement) return traceInput(element, origin);
  return Array.from(element.childNodes, (child) => traceNode(child, origin)).join("");
}

function placeOf(element: Element, origin: Origin): string {
  const box = element.getBoundingClientRect();
  const [x, y] = [svgNumber(box.left - origin.left), svgNumber(box.top - origin.top)];
  return `x="${x}" y="${y}" width="${svgNumber(box.width)}" height="${svgNumber(box.height)}"`;
}

/** Ground and border of a box, where it has any. */
function traceBox(element: Element, style: CSSStyleDeclaration, origin: Origin): string {
  const place = placeOf(element, origin);
  const radius = Number.parseFloat(style.borderTopLeftRadius) || 0;
  const round = radius > 0 ? ` rx="${svgNumber(Math.min(radius, element.getBoundingClientRect().width / 2))}"` : "";
  const ground = readColour(style.backgroundColor);
  const fill = ground ? `<rect ${place}${round} fill="${ground.colour}" fill-opacity="${ground.opacity}"/>` : "";
  const hatch = style.backgroundImage.includes("repeating-linear") ? `<rect ${place} fill="url(#hatch)"/>` : "";
  return fill + hatch + traceBorders(element, style, origin);
}

function traceBorders(element: Element, style: CSSStyleDeclaration, origin: Origin): string {
  const box = element.getBoundingClientRect();
  const [left, top] = [box.left - origin.left, box.top - origin.top];
  const [right, bottom] = [left + box.width, top + box.height];
  const sides = [
    { width: style.borderTopWidth, colour: style.borderTopColor, line: [left, top, right, top] },
    { width: style.borderRightWidth, colour: style.borderRightColor, line: [right, top, right, bottom] },
    { width: style.borderBottomWidth, colour: style.borderBottomColor, line: [left, bottom, right, bottom] },
    { width: style.borderLeftWidth, colour: style.borderLeftColor, line: [left, top, left, bottom] },
  ];
  return sides
    .map(({ width, colour, line }) => {
      const drawn = Number.parseFloat(width) > 0 ? readColour(colour) : null;
      if (!drawn) return "";
      const [x1, y1, x2, y2] = line.map(svgNumber);
      const stroke = `stroke="${drawn.colour}" stroke-opacity="${drawn.opacity}" stroke-width="${Number.parseFloat(width)}"`;
      return `<line x1="${x1}" y1="${y1}" x2="${x2}" y2="${y2}" ${stroke}/>`;
    })
    .join("");
}

function traceCanvas(canvas: HTMLCanvasElement, origin: Origin): string {
  if (canvas.width === 0 || canvas.height === 0) return "";
  const sharp = getComputedStyle(canvas).imageRendering === "pixelated" ? ` style="image-rendering:pixelated"` : "";
  const image = `href="${canvas.toDataURL("image/png")}" preserveAspectRatio="none"`;
  return `<image ${placeOf(canvas, origin)} ${image}${sharp}/>`;
}

function drawText(text: string, at: { x: number; y: number }, style: CSSStyleDeclaration): string {
  const ink = readColour(style.color) ?? { colour: "#1E2430", opacity: 1 };
  const weight = Number(style.fontWeight) >= 600 ? ` font-weight="600"` : "";
  const place = `x="${svgNumber(at.x)}" y="${svgNumber(at.y)}"`;
  const look = `font-size="${Number.parseFloat(style.fontSize) || 13}" fill="${ink.colour}" fill-opacity="${ink.opacity}"`;
  return `<text ${place} ${look}${weight}>${escapeXml(text)}</text>`;
}

/** A number in a field is as much part of a legend as one beside it. */
function traceInput(input: HTMLInputElement, origin: Origin): string {
  const style = getComputedStyle(input);
  const box = input.getBoundingClientRect();
  const x = box.left - origin.left + (Number.parseFloat(style.paddingLeft) || 0);
  const y = box.top - origin.top + box.height / 2 + (Number.parseFloat(style.fontSize) || 13) * 0.35;
  return drawText(input.value, { x, y }, style);
}

/** The lines of a text as they are broken on the screen. */
function traceText(node: Text, origin: Origin): string {
  const parent = node.parentElement;
  if (!parent || node.data.trim() === "") return "";
  const style = getComputedStyle(parent);
  return linesOf(node)
    .map(({ text, box }) => {
      const at = { x: box.left - origin.left, y: box.top - origin.top + box.height * BASELINE_SHARE };
      return drawText(text, at, style);
    })
    .join("");
}

function linesOf(node: Text): { text: string; box: DOMRect }[] {
  const range = document.createRange();
  const lines: { text: string; box: DOMRect }[] = [];
  for (const { 0: word, index } of node.data.matchAll(/\S+/g)) {
    range.setStart(node, index);
    range.setEnd(node, index + word.length);
    const box = range.getBoundingClientRect();
    const last = lines.at(-1);
    if (last && Math.abs(last.box.top - box.top) < 2) last.text += ` ${word}`;
    else lines.push({ text: word, box });
  }
  return lines;
}
