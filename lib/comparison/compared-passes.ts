import type { PlacedLog } from "@/lib/logs/placed-log";

/** The part of a log that is compared. */
export interface ComparedPasses {
  placed: PlacedLog;
  headlandPassesLeftOut: number;
}

/**
 * The log without its headland passes, which are packed and turned on: one log may have them and the other not. A log that
 * has only headland passes is kept whole. Passes stand in the order they were driven.
 */
export function comparedPasses(placed: PlacedLog): ComparedPasses {
  const inside = placed.passes.filter((pass) => !pass.headland);
  if (inside.length === 0 || inside.length === placed.passes.length) return { placed, headlandPassesLeftOut: 0 };
  const kept = new Set(inside.map(({ pass }) => pass));
  const passOf = placed.passOf.map((pass) => (kept.has(pass) ? pass : 0));
  return {
    placed: { ...placed, passes: inside, passOf },
    headlandPassesLeftOut: placed.passes.length - inside.length,
  };
}
