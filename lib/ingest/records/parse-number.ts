const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,3})?$/;
const DECIMAL_COMMA = /^([+-]?\d*),(\d+(?:[eE][+-]?\d{1,3})?)$/;
/** What files write for "nothing here". */
const MISSING = new Set(["", "na", "n/a", "nan", "null", "none", "nil", "missing", "-", "--", ".", "*"]);
/** Beyond what any reading can be and what Float32 can hold. */
const LARGEST = 1e30;

export function isMissing(text: string): boolean {
  return MISSING.has(text.trim().toLowerCase());
}

/** The number a cell holds; NaN when it holds none. Plain decimal and exponent forms only: no hex, no "Infinity". */
export function parseNumber(text: string, decimalComma = false): number {
  let plain = text.trim();
  if (decimalComma) plain = plain.replace(DECIMAL_COMMA, "$1.$2");
  if (!NUMBER.test(plain)) return NaN;
  const value = Number(plain);
  return Math.abs(value) < LARGEST ? value : NaN;
}
