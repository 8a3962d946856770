/** Codes of a value tile in fewer levels. */
export interface CoarseCodes {
  /** The code of each level; level 0 is code 0 (nothing logged). */
  codes: number[];
  /** The level of each pixel. */
  levels: Uint8Array;
  /** Codes between two levels: no pixel is more than half of it from its own code. 1 where nothing was lost. */
  coarseness: number;
}

/**
 * Rounds codes 1 .. 65535 to multiples of the smallest step found that leaves at most `mostLevels` (up to 256) of them, counting
 * the one for nothing logged, which stays as it is.
 */
export function coarsenCodes(codes: Uint16Array, mostLevels: number): CoarseCodes {
  const [least, greatest] = rangeOf(codes);
  // A step that surely does; halved as long as strays alone made it that wide.
  let coarseness = Math.max(1, Math.ceil((greatest - least) / Math.max(1, mostLevels - 3)));
  let found = levelsAt(codes, coarseness, mostLevels)!;
  while (coarseness > 1) {
    const finer = Math.ceil(coarseness / 2);
    const better = levelsAt(codes, finer, mostLevels);
    if (!better) break;
    [coarseness, found] = [finer, better];
  }
  return { ...found, coarseness };
}

function rangeOf(codes: Uint16Array): [least: number, greatest: number] {
  let [least, greatest] = [65535, 1];
  for (const code of codes) {
    if (code === 0) continue;
    if (code < least) least = code;
    if (code > greatest) greatest = code;
  }
  return [Math.min(least, greatest), greatest];
}

/** Null where there are more levels than asked for. */
function levelsAt(codes: Uint16Array, coarseness: number, mostLevels: number): Omit<CoarseCodes, "coarseness"> | null {
  const levelOf = new Int16Array(65_536).fill(-1);
  const kept = [0];
  levelOf[0] = 0;
  const levels = new Uint8Array(codes.length);
  for (let pixel = 0; pixel < codes.length; pixel += 1) {
    const code = codes[pixel]!;
    // Never 0: a reading is not nothing.
    const rounded = code === 0 ? 0 : Math.max(1, Math.min(65_535, Math.round(code / coarseness) * coarseness));
    let level = levelOf[rounded]!;
    if (level < 0) {
      if (kept.length >= mostLevels) return null;
      level = kept.length;
      levelOf[rounded] = level;
      kept.push(rounded);
    }
    levels[pixel] = level;
  }
  return { codes: kept, levels };
}
