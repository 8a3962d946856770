/** The double with the fewest digits that becomes this 32-bit number again: 412.3 for a stored 412.29998779296875. */
export function shortestFloat32(value: number): number {
  if (Number.isInteger(value) || !Number.isFinite(value)) return value;
  for (let digits = 6; digits < 9; digits++) {
    const short = Number(value.toPrecision(digits));
    if (Math.fround(short) === value) return short;
  }
  return Number(value.toPrecision(9));
}

/** A number to so many digits after the point, without trailing zeros. */
export function roundTo(value: number, decimals: number | undefined): number {
  return decimals === undefined ? value : Number(value.toFixed(decimals));
}
