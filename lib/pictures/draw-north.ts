import { svgNumber, textLine } from "@/lib/pictures/svg-text";

const BOX_PX = { width: 22, height: 34 } as const;

/** An arrow to the north in the upper left corner of a map's picture, on white so that it reads on any ground. */
export function drawNorth(): string {
  const [left, top] = [8, 8];
  const middle = left + BOX_PX.width / 2;
  const box = `x="${left}" y="${svgNumber(top)}" width="${BOX_PX.width}" height="${BOX_PX.height}"`;
  const arrow = `M${middle} ${svgNumber(top + 30)}v-15m-4 5l4 -5l4 5`;
  return (
    `<rect ${box} fill="#FFFFFF" fill-opacity="0.9"/>` +
    textLine("N", { x: middle - 4, y: top + 11 }, { sizePx: 11, colour: "#1E2430", isBold: true }) +
    `<path d="${arrow}" fill="none" stroke="#1E2430" stroke-width="1.5"/>`
  );
}
