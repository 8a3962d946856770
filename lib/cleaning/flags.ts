/** Reason codes of `domain` 4.7, one bit each. A flag never deletes a record. */
export const FLAGS = {
  "no-position": 1 << 0,
  "duplicate-time": 1 << 1,
  "impossible-step": 1 << 2,
  "not-working": 1 << 3,
  "short-pass": 1 << 4,
  turning: 1 << 5,
  "standing-still": 1 << 6,
  "hitch-unsettled": 1 << 7,
  "time-backwards": 1 << 8,
  "jack-knife": 1 << 9,
  reversing: 1 << 10,
} as const;
export type FlagCode = keyof typeof FLAGS;

/** The reason codes set in a bit field, in table order. */
export function flagCodes(bits: number): FlagCode[] {
  return (Object.keys(FLAGS) as FlagCode[]).filter((code) => (bits & FLAGS[code]) !== 0);
}
