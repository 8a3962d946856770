import { readColour } from "@/components/pictures/read-colour";
import { svgNumber } from "@/lib/pictures/svg-text";

/** Paints come as colours with an opacity of their own. */
const PAINTS = ["fill", "stroke"] as const;
/** Written out as attributes; the value that is left away because it is the default. */
const STYLES: readonly [name: string, usual: string][] = [
  ["stroke-width", "1px"],
  ["stroke-dasharray", "none"],
  ["stroke-linejoin", "miter"],
  ["stroke-linecap", "butt"],
  ["vector-effect", "none"],
  ["opacity", "1"],
  ["text-anchor", "start"],
];
const TEXT_STYLES = ["font-size", "font-weight"] as const;
const DROPPED = /^(?:class|style|id|role|tabindex|data-.*|aria-.*)$/;

/** A chart's own SVG with every style written into it, so that it looks the same without our style sheets. */
export function traceSvg(svg: SVGSVGElement, origin: { left: number; top: number }): string {
  const copy = svg.cloneNode(true) as SVGSVGElement;
  writeStyles(svg, copy);
  const box = svg.getBoundingClientRect();
  copy.setAttribute("x", svgNumber(box.left - origin.left));
  copy.setAttribute("y", svgNumber(box.top - origin.top));
  copy.setAttribute("width", svgNumber(box.width));
  copy.setAttribute("height", svgNumber(box.height));
  copy.setAttribute("overflow", getComputedStyle(svg).overflow === "visible" ? "visible" : "hidden");
  return new XMLSerializer().serializeToString(copy);
}

function writeStyles(original: Element, copy: Element): void {
  const style = getComputedStyle(original);
  const children = Array.from(copy.children);
  Array.from(original.children).forEach((child, index) => {
    const twin = children[index];
    if (!twin) return;
    if (isUnseen(child)) twin.remove();
    else writeStyles(child, twin);
  });
  for (const { name } of Array.from(copy.attributes)) if (DROPPED.test(name)) copy.removeAttribute(name);
  // Groups hand nothing down that their parts do not say themselves.
  if (["g", "svg"].includes(original.tagName)) return writeGroup(copy, style);
  for (const paint of PAINTS) writePaint(copy, paint, style);
  for (const [name, usual] of STYLES) writeStyle(copy, name, style.getPropertyValue(name), usual);
  if (["text", "tspan"].includes(original.tagName)) {
    for (const name of TEXT_STYLES) writeStyle(copy, name, style.getPropertyValue(name), "");
  }
}

function isUnseen(element: Element): boolean {
  const { display, visibility } = getComputedStyle(element);
  return element.tagName === "title" || display === "none" || visibility === "hidden";
}

function writeGroup(copy: Element, style: CSSStyleDeclaration): void {
  writeStyle(copy, "opacity", style.opacity, "1");
}

function writeStyle(copy: Element, name: string, value: string, usual: string): void {
  if (value === "" || value === usual) copy.removeAttribute(name);
  else copy.setAttribute(name, value);
}

function writePaint(copy: Element, paint: (typeof PAINTS)[number], style: CSSStyleDeclaration): void {
  const css = style.getPropertyValue(paint);
  // A pattern of the chart's own stays as it is.
  if (css === "" || css.startsWith("url(")) return;
  const ink = readColour(css);
  copy.setAttribute(paint, ink?.colour ?? "none");
  const share = Number(style.getPropertyValue(`${paint}-opacity`) || 1) * (ink?.opacity ?? 1);
  writeStyle(copy, `${paint}-opacity`, String(share), "1");
}
