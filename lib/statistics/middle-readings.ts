/**
 * What the other rows' median is read off, record by record, so that no record is sorted and no second array of all readings is
 * needed. Four numbers a record: its lower middle reading (NaN where fewer than two rows have one), then the median of all
 * others for a reading below that, equal to it, and above it.
 */
export interface MiddleReadings {
  medians: Float64Array;
}

const STRIDE = 4;
/** Readings of a record that the window about the last middle should hold: fewer miss the middle, more take time to sort. */
const WINDOW = { least: 9, most: 15, grow: 1.25, shrink: 0.85 };

/**
 * Middle readings of values that are row-major by record. The ground changes little from one record to the next: only the
 * readings near the last middle are sorted, the others counted, without a branch that could be guessed wrong. Where the middle
 * is not among them, it is selected from all. Cost: O(n).
 */
// kernel: hot loop over every reading
export function middleReadings(values: Float32Array, rows: number): MiddleReadings {
  const records = values.length / rows;
  const medians = new Float64Array(records * STRIDE).fill(NaN);
  const near = new Float32Array(rows + 1);
  let centre = NaN;
  let reach = 0;
  for (let record = 0, place = 0; record < records; record++, place += rows) {
    const low = centre - reach;
    const high = centre + reach;
    let n = 0;
    let under = 0;
    let count = 0;
    for (let i = place; i < place + rows; i++) {
      const value = values[i]!;
      near[count] = value;
      count += +(value >= low) & +(value <= high);
      under += +(value < low);
      n += +(value === value);
    }
    if (n < 2) continue;
    let middle = ((n - 1) >> 1) - under;
    if (middle >= 1 && middle + 1 < count) {
      sortFew(near, count);
      reach *= count < WINDOW.least ? WINDOW.grow : count > WINDOW.most ? WINDOW.shrink : 1;
    } else {
      middle += under;
      takePresent(values, place, near, rows);
      selectRank(near, n, middle);
      bringNeighbours(near, n, middle);
      reach =
        2 * reach || Math.min(near[middle]! - (near[middle - 1] ?? -Infinity), near[middle + 1]! - near[middle]!) || 1;
    }
    const at = near[middle]!;
    const below = middle > 0 ? near[middle - 1]! : -Infinity;
    const above = middle + 1 < Math.max(count, n) ? near[middle + 1]! : Infinity;
    centre = at;
    const isEven = n % 2 === 0;
    const into = record * STRIDE;
    medians[into] = at;
    medians[into + 1] = isEven ? above : (above + at) / 2;
    medians[into + 2] = isEven ? above : (above + below) / 2;
    medians[into + 3] = isEven ? at : (at + below) / 2;
  }
  return { medians };
}

/** The median of the record's other readings, `value` being one of them; NaN where it is the only one. */
// kernel: hot, so positional
export function medianOfOthers({ medians }: MiddleReadings, record: number, value: number): number {
  const from = record * STRIDE;
  const at = medians[from]!;
  return medians[from + 1 + +(value >= at) + +(value > at)]!;
}

/** Ascending, by insertion. */
// kernel: hot, so positional
function sortFew(values: Float32Array, n: number): void {
  for (let i = 1; i < n; i++) {
    const value = values[i]!;
    let at = i;
    while (at > 0 && values[at - 1]! > value) values[at] = values[--at]!;
    values[at] = value;
  }
}

// kernel: hot, so positional
function takePresent(values: Float32Array, from: number, into: Float32Array, rows: number): void {
  let n = 0;
  for (let i = from; i < from + rows; i++) {
    const value = values[i]!;
    if (value === value) into[n++] = value;
  }
}

/** Of values with the one of rank `middle` in place: moves the next smaller and the next larger beside it. */
// kernel: hot, so positional
function bringNeighbours(values: Float32Array, n: number, middle: number): void {
  let below = middle - 1;
  for (let i = 0; i < middle; i++) if (values[i]! > values[below]!) below = i;
  if (middle > 0) swap(values, below, middle - 1);
  let above = middle + 1;
  for (let i = middle + 1; i < n; i++) if (values[i]! < values[above]!) above = i;
  if (middle + 1 < n) swap(values, above, middle + 1);
}

// kernel: hot, so positional
function swap(values: Float32Array, a: number, b: number): void {
  const value = values[a]!;
  values[a] = values[b]!;
  values[b] = value;
}

/** Moves the value of this rank to its place, smaller ones before it and larger ones behind (Hoare 1961, FIND). */
// kernel: hot, so positional
export function selectRank(values: Float32Array, n: number, rank: number): void {
  let left = 0;
  let right = n - 1;
  while (left < right) {
    const pivot = values[rank]!;
    let i = left;
    let j = right;
    while (i <= j) {
      while (values[i]! < pivot) i++;
      while (values[j]! > pivot) j--;
      if (i > j) break;
      const swapped = values[i]!;
      values[i++] = values[j]!;
      values[j--] = swapped;
    }
    if (j < rank) left = i;
    if (rank < i) right = j;
  }
}
