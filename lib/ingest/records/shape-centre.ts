/** One position for a shape that carries a reading. Coordinates are flat: x, y, x, y, … Degrees or metres, whichever they are. */
export type Centre = [x: number, y: number];

const NOWHERE: Centre = [NaN, NaN];

/** Mean of some points. */
export function meanOfPoints(flat: ArrayLike<number>): Centre {
  const count = Math.floor(flat.length / 2);
  if (count === 0) return NOWHERE;
  const originX = flat[0] ?? NaN;
  const originY = flat[1] ?? NaN;
  let [sumX, sumY] = [0, 0];
  for (let i = 0; i < count; i++) {
    sumX += acrossSeam((flat[2 * i] ?? NaN) - originX);
    sumY += (flat[2 * i + 1] ?? NaN) - originY;
  }
  return [backOverSeam(originX + sumX / count), originY + sumY / count];
}

/**
 * Centre of area of rings; holes, wound the other way, count against it. The mean of the points where the area is nothing.
 * Sums are taken from the first corner on: far from the origin the products would lose all digits.
 */
export function centreOfRings(rings: readonly ArrayLike<number>[]): Centre {
  return measureRings(rings).centre;
}

/** The same, with the area in square units of the coordinates (square degrees count as such: see `squareMetres`). */
export function measureRings(rings: readonly ArrayLike<number>[]): { centre: Centre; area: number } {
  const first = rings[0];
  if (!first || first.length < 2) return { centre: NOWHERE, area: NaN };
  const originX = first[0] ?? NaN;
  const originY = first[1] ?? NaN;
  let [area, momentX, momentY] = [0, 0, 0];
  for (const ring of rings) {
    const count = Math.floor(ring.length / 2);
    for (let i = 0; i < count; i++) {
      const j = (i + 1) % count;
      const x0 = acrossSeam((ring[2 * i] ?? NaN) - originX);
      const x1 = acrossSeam((ring[2 * j] ?? NaN) - originX);
      const y0 = (ring[2 * i + 1] ?? NaN) - originY;
      const y1 = (ring[2 * j + 1] ?? NaN) - originY;
      const cross = x0 * y1 - x1 * y0;
      area += cross;
      momentX += (x0 + x1) * cross;
      momentY += (y0 + y1) * cross;
    }
  }
  if (area === 0) return { centre: meanOfPoints(first), area: 0 };
  const centre: Centre = [backOverSeam(originX + momentX / (3 * area)), originY + momentY / (3 * area)];
  return { centre, area: Math.abs(area) / 2 };
}

/** The place halfway along a line. */
export function midpointOfLine(flat: ArrayLike<number>): Centre {
  const count = Math.floor(flat.length / 2);
  if (count === 0) return NOWHERE;
  const lengths = Array.from({ length: count - 1 }, (_, i) => {
    const dx = acrossSeam((flat[2 * i + 2] ?? NaN) - (flat[2 * i] ?? NaN));
    return Math.hypot(dx, (flat[2 * i + 3] ?? NaN) - (flat[2 * i + 1] ?? NaN));
  });
  let left = lengths.reduce((sum, length) => sum + length, 0) / 2;
  for (const [i, length] of lengths.entries()) {
    if (length > 0 && left <= length) {
      const share = left / length;
      const dx = acrossSeam((flat[2 * i + 2] ?? NaN) - (flat[2 * i] ?? NaN));
      const y = flat[2 * i + 1] ?? NaN;
      return [backOverSeam((flat[2 * i] ?? NaN) + share * dx), y + share * ((flat[2 * i + 3] ?? NaN) - y)];
    }
    left -= length;
  }
  return [flat[0] ?? NaN, flat[1] ?? NaN];
}

/** A step of more than half the globe is a step over the antimeridian; metres take no such steps within one shape. */
function acrossSeam(dx: number): number {
  if (dx > 180 && dx <= 360) return dx - 360;
  return dx < -180 && dx >= -360 ? dx + 360 : dx;
}

function backOverSeam(x: number): number {
  if (x > 180 && x <= 360) return x - 360;
  return x < -180 && x >= -360 ? x + 360 : x;
}
