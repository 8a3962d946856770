/** Fewer passes than this give no interval: they are the units that repeat, not the readings. */
export const MIN_PASSES_FOR_INTERVAL = 8;
const RESAMPLES = 1999;

/** A small seeded generator (mulberry32), so that the same log always gets the same interval. */
function createRandom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
}

/**
 * 95 % percentile interval of the mean of one value a pass, passes drawn with replacement (block bootstrap with a pass as
 * the block, Kunsch 1989); null with fewer than eight passes.
 */
export function passInterval(passValues: readonly number[]): [number, number] | null {
  const known = passValues.filter((value) => Number.isFinite(value));
  if (known.length < MIN_PASSES_FOR_INTERVAL) return null;
  const random = createRandom(20_310_924);
  const means = new Float64Array(RESAMPLES);
  for (let b = 0; b < RESAMPLES; b++) {
    let sum = 0;
    for (let k = 0; k < known.length; k++) sum += known[Math.floor(random() * known.length)]!;
    means[b] = sum / known.length;
  }
  means.sort();
  return [means[49]!, means[RESAMPLES - 50]!];
}
