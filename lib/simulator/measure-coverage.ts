/** An axis-aligned rectangle in field axes. */
export interface Rectangle {
  fromAlongM: number;
  toAlongM: number;
  fromAcrossM: number;
  toAcrossM: number;
}

/**
 * Area of the union of rectangles, exact up to rounding: slabs between neighbouring `across` edges, union of intervals
 * within each. O(edges x rectangles). Worked example: two 100 x 10 m rectangles 9 m apart: 1900 m2.
 */
export function measureUnionM2(rectangles: readonly Rectangle[]): number {
  const edges = [...new Set(rectangles.flatMap((one) => [one.fromAcrossM, one.toAcrossM]))].sort((a, b) => a - b);
  let areaM2 = 0;
  edges.forEach((edge, index) => {
    const next = edges[index + 1];
    if (next === undefined || next - edge < 1e-9) return;
    const middle = (edge + next) / 2;
    const inSlab = rectangles.filter((one) => one.fromAcrossM < middle && one.toAcrossM > middle);
    areaM2 += (next - edge) * unionLengthM(inSlab);
  });
  return areaM2;
}

function unionLengthM(rectangles: readonly Rectangle[]): number {
  const sorted = [...rectangles].sort((a, b) => a.fromAlongM - b.fromAlongM);
  let reachedM = -Infinity;
  let lengthM = 0;
  for (const one of sorted) {
    lengthM += Math.max(0, one.toAlongM - Math.max(one.fromAlongM, reachedM));
    reachedM = Math.max(reachedM, one.toAlongM);
  }
  return lengthM;
}

export function sumAreasM2(rectangles: readonly Rectangle[]): number {
  return rectangles.reduce((sum, one) => sum + (one.toAlongM - one.fromAlongM) * (one.toAcrossM - one.fromAcrossM), 0);
}
