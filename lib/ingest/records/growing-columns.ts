/** Longest growth step, so that a wrong guess of the record count costs little. */
const GROWTH = 1.5;

export type ColumnArray = Float64Array | Float32Array | Uint32Array | Int32Array | Uint8Array;

/** A copy of `values` with room for `length` values, 0 in the new room. */
export function withRoom<T extends ColumnArray>(values: T, length: number): T {
  const roomy = new (values.constructor as new (length: number) => T)(length);
  roomy.set(values.subarray(0, Math.min(length, values.length)));
  return roomy;
}

/** Exactly the first `length` values, in a buffer of that size. */
export function trimTo<T extends ColumnArray>(values: T, length: number): T {
  return values.length === length ? values : withRoom(values, length);
}

/**
 * Room for readings, NaN all over, in memory that threads share where there is such a thing (no browser page has it unasked): a
 * log of millions of readings then goes from the thread that reads it to the one that stores it without a copy.
 */
export function readingRoom(length: number): Float32Array {
  const isShared = typeof SharedArrayBuffer !== "undefined";
  const bytes = length * Float32Array.BYTES_PER_ELEMENT;
  return (isShared ? new Float32Array(new SharedArrayBuffer(bytes)) : new Float32Array(length)).fill(NaN);
}

/** The same readings with room for `length`. */
export function withReadingRoom(values: Float32Array, length: number): Float32Array {
  const roomy = readingRoom(length);
  roomy.set(values.subarray(0, Math.min(length, values.length)));
  return roomy;
}

/** Left over at the end, as a share of what is kept, before it is worth a copy. */
const SPARE = 0.1;

/** The first `length` readings: a view of them, or a copy where that frees much room. */
export function takeReadings(values: Float32Array, length: number): Float32Array {
  return values.length <= length * (1 + SPARE) ? values.subarray(0, length) : withReadingRoom(values, length);
}

export function nextCapacity(capacity: number): number {
  return Math.ceil(capacity * GROWTH) + 1024;
}
