/** The middle value; the mean of the two middle ones for an even count. */
export function medianOf(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const half = sorted.length >> 1;
  const high = sorted[half] ?? NaN;
  return sorted.length % 2 === 1 ? high : ((sorted[half - 1] ?? NaN) + high) / 2;
}

/** Two measurements taken one right after the other. */
export interface Pair {
  ours: number;
  base: number;
}

/** Median of the ratios of pairs, with the smallest and the largest: machines drift, pairs less. */
export function pairedRatio(pairs: readonly Pair[]): string {
  const ratios = pairs.map(({ ours, base }) => ours / base);
  const range = `[${Math.min(...ratios).toFixed(2)}..${Math.max(...ratios).toFixed(2)}]`;
  return `${medianOf(ratios).toFixed(2)} ${range}, n = ${pairs.length}`;
}

/** One line of the report: what, the ratio, a note where there is one. */
export function printRatio(label: string, value: string, note = ""): void {
  console.log(`${label.padEnd(72)} ${value}${note ? `   (${note})` : ""}`);
}

/** The same beside a goal: the median of the pairs may be `atMost` that. */
export function printGoal(label: string, pairs: readonly Pair[], goal: { atMost: number; note?: string }): void {
  const median = medianOf(pairs.map(({ ours, base }) => ours / base));
  const verdict = median <= goal.atMost ? "pass" : "MISS";
  const aim = `goal: at most ${goal.atMost.toFixed(2)}`;
  printRatio(label, `${pairedRatio(pairs)}   ${aim} ${verdict}`, goal.note);
}

/** One figure beside a goal that it may not pass. */
export function printLimit(label: string, value: number, goal: { atMost: number; unit: string; note?: string }): void {
  const verdict = value <= goal.atMost ? "pass" : "MISS";
  printRatio(
    label,
    `${value.toFixed(0)} ${goal.unit}   goal: at most ${goal.atMost} ${goal.unit} ${verdict}`,
    goal.note,
  );
}
