/** A straight working pass in field axes: `along` in the direction of drilling, `across` to its right, metres from the origin. */
export interface PlannedPass {
  acrossM: number;
  fromAlongM: number;
  toAlongM: number;
}

export interface FieldAxes {
  headingRad: number;
  toPlane(alongM: number, acrossM: number): [eastM: number, northM: number];
  fromPlane(eastM: number, northM: number): [alongM: number, acrossM: number];
}

/** Axes turned so that `along` points at `headingDeg` and `across` to its right. */
export function createFieldAxes(headingDeg: number): FieldAxes {
  const headingRad = (headingDeg * Math.PI) / 180;
  const sin = Math.sin(headingRad);
  const cos = Math.cos(headingRad);
  return {
    headingRad,
    toPlane: (along, across) => [along * sin + across * cos, along * cos - across * sin],
    fromPlane: (east, north) => [east * sin + north * cos, east * cos - north * sin],
  };
}

export interface PlanInPolygon {
  /** Convex ring in field axes, [along, across]. */
  ring: [number, number][];
  widthM: number;
  spacingM: number;
  headlandM: number;
  /** Shorter lines are left undriven. */
  minimumLengthM: number;
  /** Run on until the whole width has left the field, rather than lift where the first row would leave it. */
  runsOut?: boolean;
}

/** Straight lines side by side through a convex polygon, leftmost first; the whole width stays inside, less the headland, unless it runs out. */
export function planPassesInPolygon(plan: PlanInPolygon): PlannedPass[] {
  const across = plan.ring.map((point) => point[1]);
  const lastAcrossM = Math.max(...across) - plan.widthM / 2;
  const passes: PlannedPass[] = [];
  for (let acrossM = Math.min(...across) + plan.widthM / 2; acrossM <= lastAcrossM + 1e-6; acrossM += plan.spacingM) {
    const edge = plan.widthM / 2 - 1e-6;
    const spans = [acrossM - edge, acrossM, acrossM + edge].map((line) => spanOfLine(plan.ring, line));
    const [first, last] = plan.runsOut ? [Math.min, Math.max] : [Math.max, Math.min];
    const fromAlongM = first(...spans.map((span) => span[0])) + plan.headlandM;
    const toAlongM = last(...spans.map((span) => span[1])) - plan.headlandM;
    if (toAlongM - fromAlongM >= plan.minimumLengthM) passes.push({ acrossM, fromAlongM, toAlongM });
  }
  return passes;
}

/** Where the line at `acrossM` enters and leaves a convex ring; [Infinity, -Infinity] where it misses. */
export function spanOfLine(ring: [number, number][], acrossM: number): [number, number] {
  let from = Infinity;
  let to = -Infinity;
  ring.forEach(([alongA, acrossA], index) => {
    const next = ring[(index + 1) % ring.length];
    if (!next) return;
    const [alongB, acrossB] = next;
    if (acrossA === acrossB || (acrossA - acrossM) * (acrossB - acrossM) > 0) return;
    const along = alongA + ((acrossM - acrossA) / (acrossB - acrossA)) * (alongB - alongA);
    from = Math.min(from, along);
    to = Math.max(to, along);
  });
  return [from, to];
}

/** Equal passes filling a block about the origin. */
export function planBlockPasses(passes: number, passLengthM: number, spacingM: number): PlannedPass[] {
  return Array.from({ length: passes }, (_, index) => ({
    acrossM: (index - (passes - 1) / 2) * spacingM,
    fromAlongM: -passLengthM / 2,
    toAlongM: passLengthM / 2,
  }));
}
