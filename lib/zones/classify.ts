/** Class of a value: how many of the ascending `breaks` it reaches (0 below the first; a value on an edge belongs above). */
export function classOf(value: number, breaks: readonly number[]): number {
  let found = 0;
  while (found < breaks.length && value >= breaks[found]!) found++;
  return found;
}

/** How far past an edge a smoothed value must go before the class changes: a twentieth of the narrowest class. */
export function hysteresisOf(breaks: readonly number[]): number {
  const gaps = breaks.slice(1).map((edge, k) => edge - breaks[k]!);
  const narrowest = gaps.length > 0 ? Math.min(...gaps) : Math.abs(breaks[0] ?? 0);
  return narrowest / 20;
}

/** The class after `current`, given a new value: it changes only where the edge is passed by `hysteresis`. */
// kernel: once a reading, so positional
export function nextClass(
  current: number | null,
  value: number,
  breaks: readonly number[],
  hysteresis: number,
): number {
  const plain = classOf(value, breaks);
  if (current === null || plain === current) return plain;
  const up = plain > current;
  const edge = up ? breaks[current]! : breaks[current - 1]!;
  const passed = up ? value >= edge + hysteresis : value < edge - hysteresis;
  return passed ? plain : current;
}
