import type { Frame } from "@/lib/machines/machine";

/** Standard gravity (CGPM 1901), m/s2. */
export const STANDARD_GRAVITY_MPS2 = 9.80665;

/** Moment of the weights about the hitch pin, N m. */
export function frameMomentNm(frame: Frame): number {
  const ballast = frame.ballast.reduce((sum, piece) => sum + piece.massKg * piece.behindHitchM, 0);
  return STANDARD_GRAVITY_MPS2 * (frame.massKg * frame.behindHitchM + ballast);
}

/** Sum of row forces at which the frame's wheels leave the ground. Worked example: 3000 kg at 4.0 m and 600 kg at 4.8 m,
 * rows at 5.2 m: 28 062 N, or 1169 N a row on 24 rows. */
export function frameCapacityN(frame: Frame): number {
  return frameMomentNm(frame) / frame.rowsBehindHitchM;
}

/** Load left on the frame's wheels under a sum of row forces; 0 or less: lifted. */
export function wheelLoadN(frame: Frame, sumOfForcesN: number): number {
  return (frameMomentNm(frame) - sumOfForcesN * frame.rowsBehindHitchM) / frame.wheelsBehindHitchM;
}
