/** A signal at equal steps along an axis: node k of the axis is `values[k - first]`; NaN where there is none. */
export interface GridSignal {
  first: number;
  values: Float64Array;
}

/** Nodes further apart than this from one record to the next are a gap, not a line, in steps of the grid. */
const GAP_STEPS = 6;

/**
 * Where on the ground each record's reading was made when the channel is `delayS` late: where the machine was that long
 * before, straight lines between records. NaN where that lies outside the pass.
 */
// kernel: two marching pointers over a pass
export function placesBefore(timeS: Float64Array, alongM: Float64Array, delayS: number): Float64Array {
  const places = new Float64Array(timeS.length).fill(NaN);
  const last = timeS.length - 1;
  let from = 0;
  for (let at = 0; at <= last; at++) {
    const wanted = timeS[at]! - delayS;
    if (wanted < 0 || wanted > timeS[last]!) continue;
    while (from > 0 && timeS[from]! > wanted) from--;
    while (from + 1 < last && timeS[from + 1]! <= wanted) from++;
    const share = (wanted - timeS[from]!) / (timeS[from + 1]! - timeS[from]!);
    places[at] = alongM[from]! + share * (alongM[from + 1]! - alongM[from]!);
  }
  return places;
}

/** Values at rising or falling places, put on nodes `stepM` apart by straight lines. */
// kernel: walks a pass once
export function layOnGrid(places: Float64Array, values: Float64Array, stepM: number, into: GridSignal): void {
  into.values.fill(NaN);
  for (let at = 0; at + 1 < places.length; at++) {
    const here = places[at]! / stepM;
    const next = places[at + 1]! / stepM;
    const valueHere = values[at]!;
    const valueNext = values[at + 1]!;
    // False for NaN as well.
    if (!(Math.abs(next - here) <= GAP_STEPS) || !(Math.abs(valueNext - valueHere) < Infinity)) continue;
    const slope = (valueNext - valueHere) / (next - here);
    const end = Math.floor(Math.max(here, next));
    for (let node = Math.ceil(Math.min(here, next)); node <= end; node++) {
      const index = node - into.first;
      if (next !== here && index >= 0 && index < into.values.length) {
        into.values[index] = valueHere + slope * (node - here);
      }
    }
  }
}
