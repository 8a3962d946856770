/** A stream of random numbers that is the same for the same seed and label on every machine. */
export interface SeededRandom {
  /** Even in [0, 1). */
  uniform(): number;
  /** Mean 0, standard deviation 1. */
  normal(): number;
}

/**
 * A 32-bit generator (sfc32, Chris Doty-Humphrey's public-domain PractRand; written from memory) with one stream a label,
 * so that a new cause of noise never shifts the numbers of another.
 */
export function createSeededRandom(seed: number, label: string): SeededRandom {
  const uniform = createUniform(hashLabel(seed, label));
  let spare: number | null = null;
  function normal(): number {
    if (spare !== null) {
      const value = spare;
      spare = null;
      return value;
    }
    // Box-Muller; 1 - u keeps the logarithm away from 0.
    const radius = Math.sqrt(-2 * Math.log(1 - uniform()));
    const angle = 2 * Math.PI * uniform();
    spare = radius * Math.sin(angle);
    return radius * Math.cos(angle);
  }
  return { uniform, normal };
}

function createUniform(start: number): () => number {
  let a = start | 0;
  let b = (start ^ 0x9e3779b9) | 0;
  let c = Math.imul(start, 0x85ebca6b) | 0;
  let counter = 1;
  function next(): number {
    const sum = (a + b + counter) | 0;
    counter = (counter + 1) | 0;
    a = b ^ (b >>> 9);
    b = (c + (c << 3)) | 0;
    c = (((c << 21) | (c >>> 11)) + sum) | 0;
    return (sum >>> 0) / 4294967296;
  }
  for (let warmUp = 0; warmUp < 15; warmUp += 1) next();
  return next;
}

/** FNV-1a over the label, begun with the seed. */
function hashLabel(seed: number, label: string): number {
  let hash = (0x811c9dc5 ^ seed) >>> 0;
  for (let i = 0; i < label.length; i += 1) hash = Math.imul(hash ^ label.charCodeAt(i), 0x01000193) >>> 0;
  return Math.imul(hash ^ (hash >>> 15), 0x2c1b3c6d) >>> 0;
}
