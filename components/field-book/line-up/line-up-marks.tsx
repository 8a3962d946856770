"use client";

import { ticks } from "d3-array";
import { useBookState } from "@/components/field-book/field-book-context";
import { LEFT_PX, TOP_PX, type Plot } from "@/components/field-book/line-up/line-up-plot";
import type { Classes } from "@/components/field-book/use-classes";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import { classOf } from "@/lib/legend/class-edges";
import { pickLabels } from "@/lib/legend/pick-labels";
import type { RowStatisticsBody, RowStatisticsItem } from "@/lib/schemas/logs";
import { formatNumber } from "@/lib/units/format-quantity";

export function colourOf(item: RowStatisticsItem, classes: Classes | null): string {
  if (!classes || item.p50 === null) return "#E4E0D5";
  return classes.colours[classOf(item.p50, classes.edges)] ?? "#E4E0D5";
}

export function ValueAxis({ plot, statistics }: { plot: Plot; statistics: RowStatisticsBody }) {
  const { factor, symbol } = useChannelUnits(statistics.unit, statistics.channel);
  const marks = ticks(plot.low / factor, plot.high / factor, Math.max(2, Math.floor((plot.floor - TOP_PX) / 34)));
  const step = (marks[1] ?? 1) - (marks[0] ?? 0);
  const decimals = Math.max(0, -Math.floor(Math.log10(step || 1) + 1e-9));
  return (
    <g className="tabular" fontSize={11}>
      <text x={0} y={10} fill="#4A5261">
        {symbol}
      </text>
      {marks.map((mark) => (
        <g key={mark}>
          <line
            x1={LEFT_PX}
            x2={plot.width}
            y1={plot.yOf(mark * factor)}
            y2={plot.yOf(mark * factor)}
            stroke="#E4E0D5"
          />
          <text x={LEFT_PX - 8} y={plot.yOf(mark * factor) + 4} textAnchor="end" fill="#4A5261">
            {formatNumber(mark, decimals)}
          </text>
        </g>
      ))}
    </g>
  );
}

/** What the machine was set to hold; left out where the rows never came near it. */
export function TargetLine({ plot, value }: { plot: Plot; value: number }) {
  if (value < plot.low || value > plot.high) return null;
  const y = plot.yOf(value);
  return (
    <g className="pointer-events-none" data-testid="target-line">
      <line x1={LEFT_PX} x2={plot.width} y1={y} y2={y} stroke="#FFFFFF" strokeWidth={3} strokeOpacity={0.8} />
      <line x1={LEFT_PX} x2={plot.width} y1={y} y2={y} stroke="#7D5A14" strokeWidth={1.5} strokeDasharray="4 3" />
      <text x={plot.width} y={TOP_PX - 5} textAnchor="end" fontSize={11} fill="#7D5A14">
        dashed: target
      </text>
    </g>
  );
}

/** A shade behind the row pointed at; on its own, so that pointing does not draw every row again. */
export function PointedRow({ plot }: { plot: Plot }) {
  const row = useBookState((state) => state.cursor?.row ?? null);
  if (row === null) return null;
  const x = plot.middleOf(row) - plot.rowPx / 2;
  return <rect x={x} y={0} width={plot.rowPx} height={plot.height} fill="#1E2430" fillOpacity={0.08} />;
}

interface RowMarkProps {
  item: RowStatisticsItem;
  plot: Plot;
  colour: string;
  selected: boolean;
  onChoose: () => void;
}

export function RowMark({ item, plot, colour, selected, onChoose }: RowMarkProps) {
  const middle = plot.middleOf(item.row);
  const left = middle - plot.rowPx / 2;
  const boxWidth = Math.max(3, Math.min(16, plot.rowPx * 0.62));
  const words = `Row ${item.row}${item.flagged ? ", stands out" : ""}`;
  return (
    <g
      id={`line-up-row-${item.row}`}
      role="option"
      aria-selected={selected}
      aria-label={words}
      data-row={item.row}
      onClick={onChoose}
      className="cursor-pointer"
    >
      <title>{words}</title>
      <rect x={left} y={0} width={plot.rowPx} height={plot.height} fill="#1E2430" fillOpacity={0} />
      {item.p05 !== null && item.p95 !== null && item.p50 !== null ? (
        <g>
          <line x1={middle} x2={middle} y1={plot.yOf(item.p95)} y2={plot.yOf(item.p05)} stroke="#6B7280" />
          <rect
            x={middle - boxWidth / 2}
            y={plot.yOf(item.p75 ?? item.p50)}
            width={boxWidth}
            height={Math.max(2, plot.yOf(item.p25 ?? item.p50) - plot.yOf(item.p75 ?? item.p50))}
            fill={colour}
            stroke="#1E2430"
            strokeWidth={0.75}
          />
          <line
            x1={middle - boxWidth / 2 - 1}
            x2={middle + boxWidth / 2 + 1}
            y1={plot.yOf(item.p50)}
            y2={plot.yOf(item.p50)}
            stroke="#1E2430"
            strokeWidth={2}
          />
        </g>
      ) : null}
      {item.flagged ? <rect x={middle - 4} y={1} width={8} height={8} fill="#9A4A2C" /> : null}
      {selected ? (
        <rect
          x={left + 0.5}
          y={1}
          width={Math.max(4, plot.rowPx - 1)}
          height={plot.height - 2}
          fill="none"
          stroke="#2F5D80"
          strokeWidth={2}
        />
      ) : null}
    </g>
  );
}

export function RowNumbers({
  plot,
  items,
  selected,
}: {
  plot: Plot;
  items: readonly RowStatisticsItem[];
  selected: number | null;
}) {
  const every = [1, 2, 4, 6, 8, 12, 24].find((step) => step * plot.rowPx >= 20) ?? 48;
  const isShown = ({ row, flagged }: RowStatisticsItem) => row === selected || flagged;
  const weightOf = ({ row, flagged }: RowStatisticsItem) => (row === selected ? 3 : flagged ? 2 : 0);
  const wanted = items.filter((item) => isShown(item) || item.row === 1 || item.row % every === 0);
  const kept = pickLabels(
    wanted.map((item) => ({ row: item.row, weight: weightOf(item) })),
    { rowPx: plot.rowPx, leastPx: 20 },
  );
  return (
    <g fontSize={11} textAnchor="middle" className="tabular pointer-events-none">
      {items
        .filter((item) => kept.includes(item.row))
        .map((item) => (
          <text
            key={item.row}
            x={plot.middleOf(item.row)}
            y={plot.height - 4}
            fill={item.row === selected ? "#2F5D80" : item.flagged ? "#9A4A2C" : "#4A5261"}
            fontWeight={isShown(item) ? 600 : 400}
          >
            {item.row}
          </text>
        ))}
    </g>
  );
}
