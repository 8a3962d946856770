/** The smallest of 1, 2, 2.5, 5 times a power of ten that is at least `least`. */
export function niceStep(least: number): number {
  const power = 10 ** Math.floor(Math.log10(least));
  const factor = [1, 2, 2.5, 5, 10].find((one) => one * power >= least * (1 - 1e-9)) ?? 10;
  return factor * power;
}
