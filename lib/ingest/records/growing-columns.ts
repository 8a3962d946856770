/** Longest growth step, so that a wrong guess of the record count costs little. */
const GROWTH = 1.5;

export type ColumnArray = Float64Array | Float32Array | Uint32Array | Int32Array | Uint8Array;

/** A copy of `values` with room for `length` values; the new room is filled with `fill` where it is not 0. */
export function withRoom<T extends ColumnArray>(values: T, length: number, fill = 0): T {
  const roomy = new (values.constructor as new (length: number) => T)(length);
  roomy.set(values.subarray(0, Math.min(length, values.length)));
  if (fill !== 0 && length > values.length) roomy.fill(fill, values.length);
  return roomy;
}

/** Exactly the first `length` values, in a buffer of that size. */
export function trimTo<T extends ColumnArray>(values: T, length: number): T {
  return values.length === length ? values : withRoom(values, length);
}

export function nextCapacity(capacity: number): number {
  return Math.ceil(capacity * GROWTH) + 1024;
}
