import { presetsFor, proposeEdges, type EdgeContext, type EdgePreset } from "@/lib/legend/propose-edges";

/** Where the class edges in use come from: everyone's, a way of making them, or numbers of the person's own. */
export type EdgesInUse = "ours" | "own" | EdgePreset;

interface KnownEdges {
  /** Those the person set. */
  own?: readonly number[];
  /** Those the organisation keeps. */
  ours?: readonly number[];
  context: EdgeContext;
}

/** Names the edges in use: own ones that a preset would give too go by its name. */
export function nameEdges({ own, ours, context }: KnownEdges): EdgesInUse {
  const presets = presetsFor(context);
  if (!own) return ours ? "ours" : (presets[0] ?? "own");
  return presets.find((preset) => areAlike(own, proposeEdges(preset, context))) ?? "own";
}

/** To a millionth of what they span: an address carries nine figures. */
export function areAlike(a: readonly number[], b: readonly number[]): boolean {
  const blur = 1e-6 * Math.max(Math.abs((a.at(-1) ?? 0) - (a[0] ?? 0)), Math.abs(a[0] ?? 0), 1e-9);
  return a.length === b.length && a.every((edge, i) => Math.abs(edge - b[i]!) <= blur);
}
