/**
 * Moving mean over `windowM` of travel centred on each reading, weighted by length; missing readings are left out of the
 * mean. A reading further than the window from any other keeps its own value; NaN where the window holds none.
 */
export function smoothTrack(values: Float64Array, lengthsM: Float64Array, windowM: number): Float64Array {
  const smoothed = new Float64Array(values.length);
  const middles = new Float64Array(values.length);
  for (let i = 0, at = 0; i < values.length; i++) {
    middles[i] = at + lengthsM[i]! / 2;
    at += lengthsM[i]!;
  }
  let from = 0;
  let end = 0;
  let sum = 0;
  let weight = 0;
  for (let i = 0; i < values.length; i++) {
    while (end < values.length && middles[end]! - middles[i]! <= windowM / 2) {
      if (!Number.isNaN(values[end]!)) [sum, weight] = [sum + values[end]! * lengthsM[end]!, weight + lengthsM[end]!];
      end++;
    }
    while (middles[i]! - middles[from]! > windowM / 2) {
      if (!Number.isNaN(values[from]!))
        [sum, weight] = [sum - values[from]! * lengthsM[from]!, weight - lengthsM[from]!];
      from++;
    }
    smoothed[i] = weight > 1e-9 ? sum / weight : values[i]!;
  }
  return smoothed;
}
