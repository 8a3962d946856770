/** NaN and the infinities become null, as JSON has them. */
export function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
