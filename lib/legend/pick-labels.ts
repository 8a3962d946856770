/** A label that wants a place on a line: the higher `weight`, the sooner it gets one. */
export interface WantedLabel {
  row: number;
  weight: number;
}

/** The labels that keep at least `leastPx` between them, the weighty ones first, then in the order of the rows. */
export function pickLabels(
  wanted: readonly WantedLabel[],
  { rowPx, leastPx }: { rowPx: number; leastPx: number },
): number[] {
  const kept: number[] = [];
  for (const { row } of wanted.toSorted((a, b) => b.weight - a.weight || a.row - b.row)) {
    if (kept.every((other) => Math.abs(other - row) * rowPx >= leastPx)) kept.push(row);
  }
  return kept.sort((a, b) => a - b);
}
