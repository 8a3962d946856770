import { TEN_TO } from "@/lib/ingest/records/parse-number";

/**
 * kernel: the number in `bytes[start .. end)` with blanks around it, exactly for up to 15 digits; NaN when the cell is not a
 * plain number, and the caller then reads it as text.
 */
export function readNumberBytes(bytes: Uint8Array, start: number, end: number): number {
  let at = start;
  let last = end;
  while (at < last && bytes[at] === 32) at++;
  while (last > at && (bytes[last - 1] === 32 || bytes[last - 1] === 0)) last--;
  const isNegative = bytes[at] === 45;
  if (isNegative) at++;
  const first = at;
  let mantissa = 0;
  let point = -1;
  for (; at < last; at++) {
    const byte = bytes[at]!;
    if (byte >= 48 && byte <= 57) mantissa = mantissa * 10 + (byte - 48);
    else if (byte === 46 && point < 0) point = at;
    else return NaN;
  }
  const digits = last - first - (point < 0 ? 0 : 1);
  if (digits < 1 || digits > 15) return NaN;
  const value = point < 0 ? mantissa : mantissa / TEN_TO[last - point - 1]!;
  return isNegative ? -value : value;
}
