/** `from`, `from + step`, ... up to `to`. */
export function delaySteps(from: number, to: number, step: number): number[] {
  return Array.from({ length: Math.round((to - from) / step) + 1 }, (_, k) => from + k * step);
}
