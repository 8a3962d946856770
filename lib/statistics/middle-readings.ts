/**
 * The readings in the middle of each record, one entry a record: the median of all rows but any one is read off these three,
 * so that no record is sorted and no second array of all readings is needed.
 */
export interface MiddleReadings {
  /** The lower middle reading of the record; NaN where fewer than two rows have one. */
  at: Float32Array;
  /** The next smaller and the next larger one (-Infinity, Infinity where there is none). */
  below: Float32Array;
  above: Float32Array;
  /** 1 where the number of readings is even. */
  even: Uint8Array;
}

/** Middle readings of values that are row-major by record. O(n): the middle is selected, the record not sorted. */
// kernel: hot loop over every reading
export function middleReadings(values: Float32Array, rows: number): MiddleReadings {
  const records = values.length / rows;
  const single = () => new Float32Array(records).fill(NaN);
  const middles = { at: single(), below: single(), above: single(), even: new Uint8Array(records) };
  const readings = new Float32Array(rows);
  for (let record = 0, place = 0; record < records; record++) {
    let n = 0;
    for (const end = place + rows; place < end; place++) {
      const value = values[place]!;
      if (value === value) readings[n++] = value;
    }
    if (n < 2) continue;
    const middle = (n - 1) >> 1;
    selectRank(readings, n, middle);
    let below = -Infinity;
    for (let i = 0; i < middle; i++) if (readings[i]! > below) below = readings[i]!;
    let above = Infinity;
    for (let i = middle + 1; i < n; i++) if (readings[i]! < above) above = readings[i]!;
    middles.at[record] = readings[middle]!;
    middles.below[record] = below;
    middles.above[record] = above;
    middles.even[record] = n % 2 === 0 ? 1 : 0;
  }
  return middles;
}

/** The median of the record's other readings, `value` being one of them; NaN where it is the only one. */
// kernel: hot, so positional
export function medianOfOthers(middles: MiddleReadings, record: number, value: number): number {
  const at = middles.at[record]!;
  const high = value > at ? at : middles.above[record]!;
  if (middles.even[record] === 1) return high;
  return (high + (value >= at ? middles.below[record]! : at)) / 2;
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
