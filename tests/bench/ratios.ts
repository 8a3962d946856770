/** The middle value; the mean of the two middle ones for an even count. */
export function medianOf(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const half = sorted.length >> 1;
  const high = sorted[half] ?? NaN;
  return sorted.length % 2 === 1 ? high : ((sorted[half - 1] ?? NaN) + high) / 2;
}

/** Median of the ratios of pairs taken one after the other, with the smallest and the largest: machines drift, pairs less. */
export function pairedRatio(pairs: readonly { ours: number; base: number }[]): string {
  const ratios = pairs.map(({ ours, base }) => ours / base);
  const range = `[${Math.min(...ratios).toFixed(2)}..${Math.max(...ratios).toFixed(2)}]`;
  return `${medianOf(ratios).toFixed(2)} ${range}, n = ${pairs.length}`;
}

/** One line of the report: what, the ratio, the goal where there is one. */
export function printRatio(label: string, value: string, note = ""): void {
  console.log(`${label.padEnd(64)} ${value}${note ? `   (${note})` : ""}`);
}
