import { formatNumber } from "@/lib/units/format-quantity";

export interface ShownUnit {
  symbol: string;
  /** SI units in one shown unit. */
  factor: number;
  decimals: number;
}

/** Decimals that tell every edge from the next, at least the unit's own. */
function decimalsOf(edges: readonly number[], least: number): number {
  for (let decimals = least; decimals < 4; decimals += 1) {
    const texts = edges.map((edge) => edge.toFixed(decimals));
    if (new Set(texts).size === texts.length) return decimals;
  }
  return 4;
}

/** The range of each class in words, lowest first: "under 180 N", "180 to 490 N", "890 N and more". Read without any colour. */
export function classLabels(edgesSi: readonly number[], { symbol, factor, decimals }: ShownUnit): string[] {
  const edges = edgesSi.map((edge) => edge / factor);
  const places = decimalsOf(edges, decimals);
  const unit = symbol === "" || symbol === "°" ? symbol : `\u202f${symbol}`;
  const texts = edges.map((edge) => formatNumber(edge, places));
  if (texts.length === 0) return ["all readings"];
  return [
    `under ${texts[0]}${unit}`,
    ...texts.slice(1).map((upper, index) => `${texts[index]} to ${upper}${unit}`),
    `${texts.at(-1)}${unit} and more`,
  ];
}
