"use client";

import {
  LEFT_PX,
  SCORE_HEIGHT_PX,
  STRIP_PX,
  type Plot,
  type ShareStrip,
} from "@/components/field-book/line-up/line-up-plot";
import type { RowStatisticsItem } from "@/lib/schemas/logs";

/** |z| beyond which a row stands out (Iglewicz and Hoaglin 1993); the API flags by the same. */
export const Z_LIMIT = 3.5;
/** Scores beyond this are cut off and marked: a worn row may reach 80. */
const MOST_Z = 7;

interface ScoreStripProps {
  plot: Plot;
  items: readonly RowStatisticsItem[];
}

/** How far each row is from the others, in robust standard deviations, with the limit both ways. */
export function ScoreStrip({ plot, items }: ScoreStripProps) {
  const { scoreTop } = plot;
  if (scoreTop === null) return null;
  const middle = scoreTop + SCORE_HEIGHT_PX / 2;
  const yOf = (z: number) => middle - (Math.max(-MOST_Z, Math.min(MOST_Z, z)) / MOST_Z) * (SCORE_HEIGHT_PX / 2);
  return (
    <g className="pointer-events-none tabular" fontSize={11} fill="#4A5261" data-testid="score-strip">
      {[Z_LIMIT, -Z_LIMIT].map((limit) => (
        <g key={limit}>
          <line
            x1={LEFT_PX}
            x2={plot.width}
            y1={yOf(limit)}
            y2={yOf(limit)}
            stroke="#9A4A2C"
            strokeDasharray="4 3"
            data-testid="score-limit"
          />
          <text x={LEFT_PX - 8} y={yOf(limit) + 4} textAnchor="end">
            {limit > 0 ? "3.5" : "\u22123.5"}
          </text>
        </g>
      ))}
      <text x={0} y={middle + 4}>
        z
      </text>
      <line x1={LEFT_PX} x2={plot.width} y1={middle} y2={middle} stroke="#8C8778" />
      {items.map((item) =>
        item.deviationZ === null ? null : <ScoreBar key={item.row} {...{ item, plot, yOf, middle }} />,
      )}
    </g>
  );
}

interface ScoreBarProps {
  item: RowStatisticsItem;
  plot: Plot;
  yOf: (z: number) => number;
  middle: number;
}

function ScoreBar({ item, plot, yOf, middle }: ScoreBarProps) {
  const z = item.deviationZ ?? 0;
  const x = plot.middleOf(item.row);
  const width = Math.max(2, Math.min(8, plot.rowPx * 0.5));
  const end = yOf(z);
  const isCut = Math.abs(z) > MOST_Z;
  return (
    <g data-score-row={item.row}>
      <rect
        x={x - width / 2}
        y={Math.min(end, middle)}
        width={width}
        height={Math.max(1, Math.abs(end - middle))}
        fill={item.flagged ? "#9A4A2C" : "#6B7280"}
      />
      {isCut ? (
        <path d={`M${x - 5} ${end}l5 ${z > 0 ? -5 : 5}l5 ${z > 0 ? 5 : -5}Z`} fill="#1E2430" data-testid="score-cut" />
      ) : null}
    </g>
  );
}

interface ShareStripsProps {
  plot: Plot;
  shares: readonly ShareStrip[];
}

/** Shares of the distance, one strip each; the full height is all of it. */
export function ShareStrips({ plot, shares }: ShareStripsProps) {
  const width = Math.max(3, Math.min(16, plot.rowPx * 0.62));
  return (
    <g className="pointer-events-none tabular" fontSize={11} fill="#4A5261">
      {shares.map((strip, index) => {
        const foot = plot.shareTops[index]! + STRIP_PX;
        return (
          <g key={strip.id} data-testid={`share-${strip.id}`}>
            <text x={LEFT_PX - 8} y={foot - 10} textAnchor="end">
              {strip.short}
            </text>
            <text x={LEFT_PX - 8} y={foot + 1} textAnchor="end">
              0–100
            </text>
            <line x1={LEFT_PX} x2={plot.width} y1={foot} y2={foot} stroke="#8C8778" />
            {strip.values.map((share, row) =>
              share === null ? null : (
                <rect
                  key={row}
                  x={plot.middleOf(row + 1) - width / 2}
                  y={foot - STRIP_PX * share}
                  width={width}
                  height={STRIP_PX * share}
                  fill="#1E2430"
                />
              ),
            )}
          </g>
        );
      })}
    </g>
  );
}
