import type { CellRun } from "@/lib/coverage/cell-runs";

/** A corner of the grid, in cells. */
export type Corner = [column: number, row: number];

/**
 * Outlines of the cells of one piece of ground (runs in order, that touch in sides), closed: counter-clockwise about ground,
 * clockwise about holes. A hole may touch the outline in a corner. Cost: the length of the outline.
 */
export function outlineCells(runs: readonly CellRun[]): Corner[][] {
  const edges = new Map<string, Corner[]>();
  const add = (from: Corner, to: Corner) => {
    const key = `${from[0]} ${from[1]}`;
    const there = edges.get(key);
    if (there) there.push(to);
    else edges.set(key, [to]);
  };
  const rows = new Map<number, CellRun[]>();
  for (const run of runs) rows.set(run.row, [...(rows.get(run.row) ?? []), run]);
  for (const run of runs) {
    const { row, from, end } = run;
    add([end, row], [end, row + 1]);
    add([from, row + 1], [from, row]);
    for (const [a, b] of openParts(run, rows.get(row - 1) ?? [])) add([a, row], [b, row]);
    for (const [a, b] of openParts(run, rows.get(row + 1) ?? [])) add([b, row + 1], [a, row + 1]);
  }
  const rings: Corner[][] = [];
  for (const key of edges.keys()) {
    while ((edges.get(key)?.length ?? 0) > 0) rings.push(walkRing(edges, key.split(" ").map(Number) as Corner));
  }
  return rings;
}

/** Parts of a run that have no cell of the neighbouring row against them. */
function openParts({ from, end }: CellRun, neighbours: readonly CellRun[]): [number, number][] {
  const parts: [number, number][] = [];
  let at = from;
  for (const other of neighbours) {
    if (other.end <= at) continue;
    if (other.from >= end) break;
    if (other.from > at) parts.push([at, other.from]);
    at = Math.max(at, other.end);
  }
  if (at < end) parts.push([at, end]);
  return parts;
}

function walkRing(edges: Map<string, Corner[]>, start: Corner): Corner[] {
  const ring: Corner[] = [start];
  let before: Corner = start;
  let here: Corner = takeEdge(edges, start, null);
  while (here[0] !== start[0] || here[1] !== start[1]) {
    ring.push(here);
    const next = takeEdge(edges, here, before);
    before = here;
    here = next;
  }
  return [...ring, start];
}

/** The edge that leaves a corner; where two do, the one that turns right, which leaves a hole that touches apart. */
function takeEdge(edges: Map<string, Corner[]>, here: Corner, before: Corner | null): Corner {
  const leaving = edges.get(`${here[0]} ${here[1]}`) ?? [];
  const right = leaving.findIndex((to) => before !== null && turn(before, here, to) < 0);
  const [taken] = leaving.splice(Math.max(0, right), 1);
  if (!taken) throw new RangeError("outlineCells: runs must be in order and must not overlap");
  return taken;
}

function turn(a: Corner, b: Corner, c: Corner): number {
  return (b[0] - a[0]) * (c[1] - b[1]) - (b[1] - a[1]) * (c[0] - b[0]);
}

/** Twice the area of a closed ring, positive counter-clockwise. */
export function doubledArea(ring: readonly (readonly number[])[]): number {
  let sum = 0;
  for (let k = 1; k < ring.length; k++) sum += ring[k - 1]![0]! * ring[k]![1]! - ring[k]![0]! * ring[k - 1]![1]!;
  return sum;
}
