import { comparedPasses } from "@/lib/comparison/compared-passes";
import type { DrawnFigure } from "@/lib/comparison/difference-interval";
import { passMeans, passTotals, wholePart, type WholePart } from "@/lib/comparison/pass-totals";
import { planBlocks, type Blocks } from "@/lib/comparison/plan-blocks";
import { DRAWS, drawPasses, type DrawnMeans } from "@/lib/pass-figures/draw-passes";
import type { ChannelOnGround } from "@/lib/pass-figures/pass-readings";
import { median } from "@/lib/statistics/median";
import { partMeans, type PassSums } from "@/lib/pass-figures/resample-passes";

const SEED = 20_311_015;
/** Fewer blocks than this give no interval. */
export const LEAST_BLOCKS = 8;

/** How passes are drawn anew for a question, and the means in every draw; null with too few blocks. */
export interface Drawing {
  blocks: Blocks;
  drawn: DrawnMeans | null;
}

/** One of two logs: what is compared of it, summed by passes and, with enough passes, drawn anew. */
export interface ComparedSide {
  from: ChannelOnGround;
  headlandPassesLeftOut: number;
  sums: PassSums;
  means: Float64Array;
  /** For figures of the whole machine, and of one row as it is: blocks by how alike the means of neighbouring passes are. */
  whole: Drawing;
  /** For rows against each other: what a pass does to all rows does not count, so blocks go by the rows' deviations. */
  rows: Drawing;
  centre: number;
}

/** `label` keeps the draws of the two logs apart. `centre` is any value near the readings. */
export function comparedSide(
  given: ChannelOnGround,
  { label, centre }: { label: string; centre: number },
): ComparedSide {
  const { placed, headlandPassesLeftOut } = comparedPasses(given.placed);
  const from = { ...given, placed };
  const sums = passTotals(from, centre);
  const draw = (series: Float64Array[]): Drawing => {
    const blocks = planBlocks(series);
    const { passesPerBlock } = blocks;
    const isEnough = blocks.blocks >= LEAST_BLOCKS;
    return { blocks, drawn: isEnough ? drawPasses(sums, { passesPerBlock, seed: SEED, label }) : null };
  };
  const whole = draw([passMeans(sums, wholePart(from.channel.rows, "mean"))]);
  const rows = draw(rowDeviations(sums, from.channel.rows));
  return { from, headlandPassesLeftOut, sums, means: partMeans(sums), whole, rows, centre };
}

/** Of each row, its mean in each pass less the middle row's. */
function rowDeviations(sums: PassSums, rows: number): Float64Array[] {
  const means = Array.from({ length: rows }, (_, row) => passMeans(sums, row));
  const middles = Float64Array.from({ length: sums.passes }, (_, pass) => median(means.map((row) => row[pass]!)));
  return means.map((row) => row.map((mean, pass) => mean - middles[pass]!));
}

/** One part's mean, as it is and drawn; without draws these are empty. */
export function figureOf({ means }: ComparedSide, { drawn, blocks }: Drawing, part: number): DrawnFigure {
  return {
    value: means[part]!,
    drawn: drawn ? Float64Array.from({ length: DRAWS }, (_, k) => drawn.means[k * drawn.parts + part]!) : NONE,
    blocks: blocks.blocks,
  };
}

const NONE = new Float64Array(0);

export function wholeFigure(side: ComparedSide, name: WholePart): DrawnFigure {
  return figureOf(side, side.whole, wholePart(side.from.channel.rows, name));
}

/** Standard deviation over distance, from means and mean squares about `centre`. */
export function spreadFigure(side: ComparedSide): DrawnFigure {
  const [mean, square] = [wholeFigure(side, "mean"), wholeFigure(side, "square")];
  const spread = (m: number, s: number) => Math.sqrt(Math.max(0, s - (m - side.centre) ** 2));
  return {
    value: spread(mean.value, square.value),
    drawn: mean.drawn.map((value, k) => spread(value, square.drawn[k]!)),
    blocks: mean.blocks,
  };
}
