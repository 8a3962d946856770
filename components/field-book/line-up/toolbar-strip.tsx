"use client";

import { LEFT_PX, type Plot } from "@/components/field-book/line-up/line-up-plot";
import type { RowSpan, ToolbarLayout } from "@/lib/rows/toolbar-layout";

interface ToolbarStripProps {
  plot: Plot;
  layout: ToolbarLayout;
  wheelTrackRows: readonly number[];
}

const BAR_Y = 9;
/** Pixels between the front and the rear rank. */
const RANK_PX = 6;

/** The toolbar under the plot: frame with its joints, row units front and rear, sections, and wheels before the rows in their tracks. */
export function ToolbarStrip({ plot, layout, wheelTrackRows }: ToolbarStripProps) {
  const { toolbarTop: top, middleOf, rowPx } = plot;
  const edges = ({ first, last }: RowSpan) =>
    [middleOf(first) - rowPx / 2 + 1, middleOf(last) + rowPx / 2 - 1] as const;
  const farthest = Math.max(...layout.forwardM);
  const nearest = Math.min(...layout.forwardM);
  const back = (row: number) =>
    farthest > nearest ? (RANK_PX * (farthest - layout.forwardM[row - 1]!)) / (farthest - nearest) : 0;
  return (
    <g className="pointer-events-none" data-testid="toolbar-strip" fontSize={11} fill="#4A5261">
      <text x={LEFT_PX - 8} y={top + BAR_Y + 4} textAnchor="end">
        toolbar
      </text>
      {layout.wings.map((wing) => {
        const [x1, x2] = edges(wing);
        return (
          <line key={wing.first} x1={x1} x2={x2} y1={top + BAR_Y} y2={top + BAR_Y} stroke="#1E2430" strokeWidth={3} />
        );
      })}
      {layout.wings.slice(1).map(({ first }) => (
        <circle
          key={first}
          cx={middleOf(first) - rowPx / 2}
          cy={top + BAR_Y}
          r={3}
          fill="#FFFFFF"
          stroke="#1E2430"
          strokeWidth={1.5}
          data-testid="wing-joint"
        />
      ))}
      {layout.offsetM.map((_, index) => {
        const x = middleOf(index + 1);
        const y = top + BAR_Y + 2 + back(index + 1);
        return (
          <path key={index} d={`M${x} ${top + BAR_Y}V${y + 5}`} stroke="#7D5A14" strokeWidth={rowPx < 6 ? 1 : 2} />
        );
      })}
      {wheelTrackRows.map((row) => (
        <rect
          key={row}
          x={middleOf(row) - Math.min(4, rowPx / 3)}
          y={top - 2}
          width={Math.min(8, (2 * rowPx) / 3)}
          height={8}
          rx={2}
          fill="#1E2430"
          data-testid="wheel-track"
        />
      ))}
      {layout.sections.map((section) => {
        const [x1, x2] = edges(section);
        const y = top + BAR_Y + RANK_PX + 10;
        return (
          <path
            key={section.first}
            d={`M${x1} ${y - 4}V${y}H${x2}V${y - 4}`}
            fill="none"
            stroke="#8C8778"
            data-testid="section"
          />
        );
      })}
    </g>
  );
}
