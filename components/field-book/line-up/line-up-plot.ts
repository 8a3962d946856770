import { extent } from "d3-array";
import type { ToolbarLayout } from "@/lib/rows/toolbar-layout";
import type { RowStatisticsItem } from "@/lib/schemas/logs";

export const LEFT_PX = 46;
export const RIGHT_PX = 6;
export const TOP_PX = 16;
/** Row numbers at the foot. */
const NUMBERS_PX = 16;
/** The toolbar with its row units above them. */
const TOOLBAR_PX = 26;
export const STRIP_PX = 22;
const STRIP_GAP_PX = 8;
/** The score's strip is taller: it goes both ways. */
const SCORE_PX = 34;

/** A share of the distance, one a row. */
export interface ShareStrip {
  id: string;
  /** In the margin left of the strip. */
  short: string;
  /** In a sentence: "under target". */
  words: string;
  values: (number | null)[];
}

export interface Plot {
  width: number;
  height: number;
  /** Pixels of the lower end of the values and of a value. */
  floor: number;
  yOf: (value: number) => number;
  low: number;
  high: number;
  /** Pixels a row has to itself. */
  rowPx: number;
  /** Pixels of a row's middle, rows from 1. */
  middleOf: (row: number) => number;
  /** Where the score's strip begins; null where no row has one. */
  scoreTop: number | null;
  /** Where each strip of shares begins. */
  shareTops: number[];
  toolbarTop: number;
}

export const SCORE_HEIGHT_PX = SCORE_PX;

export interface PlotOptions {
  width: number;
  height: number;
  layout: ToolbarLayout;
  shares: readonly ShareStrip[];
}

/** Where everything of the line-up stands; null where no row has a reading. */
export function plotOf(items: readonly RowStatisticsItem[], options: PlotOptions): Plot | null {
  const { width, height, layout, shares } = options;
  const [low, high] = extent(items.flatMap((item) => [item.p05, item.p95]).filter((value) => value !== null));
  if (low === undefined || high === undefined) return null;
  const hasScore = items.some((item) => item.deviationZ !== null);
  const toolbarTop = height - NUMBERS_PX - TOOLBAR_PX;
  const strips = shares.length * (STRIP_PX + STRIP_GAP_PX) + (hasScore ? SCORE_PX + STRIP_GAP_PX : 0);
  const floor = Math.max(TOP_PX + 40, toolbarTop - 4 - strips);
  const scoreTop = hasScore ? floor + STRIP_GAP_PX : null;
  const firstShare = floor + STRIP_GAP_PX + (hasScore ? SCORE_PX + STRIP_GAP_PX : 0);
  const margin = (high - low || 1) * 0.06;
  const across = spread(layout, width);
  return {
    width,
    height,
    floor,
    yOf: (value) => TOP_PX + ((high + margin - value) / (high - low + 2 * margin)) * (floor - TOP_PX),
    low: low - margin,
    high: high + margin,
    ...across,
    scoreTop,
    shareTops: shares.map((_, index) => firstShare + index * (STRIP_PX + STRIP_GAP_PX)),
    toolbarTop,
  };
}

/** Rows across the width as they stand on the toolbar: true distances, so a wider gap shows as one. */
function spread({ offsetM }: ToolbarLayout, width: number): Pick<Plot, "rowPx" | "middleOf"> {
  const room = width - LEFT_PX - RIGHT_PX;
  const order = [...offsetM].sort((a, b) => a - b);
  const [first = 0] = order;
  const span = (order.at(-1) ?? 0) - first;
  const gaps = order.slice(1).map((offset, index) => offset - order[index]!);
  const least = Math.min(...gaps);
  // Rows on top of each other, or a slip in the machine: even steps.
  if (!(least > span / (20 * offsetM.length)) || order.some((offset, index) => offset !== offsetM[index])) {
    const rowPx = room / (offsetM.length || 1);
    return { rowPx, middleOf: (row) => LEFT_PX + (row - 0.5) * rowPx };
  }
  const perM = room / (span + least);
  return { rowPx: least * perM, middleOf: (row) => LEFT_PX + (offsetM[row - 1]! - first + least / 2) * perM };
}
