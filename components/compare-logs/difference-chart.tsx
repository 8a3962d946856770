"use client";

import { useRef, type KeyboardEvent } from "react";
import { FRAME, RowAxis, rowMiddle, ValueAxis, valueScale } from "@/components/compare-logs/chart-frame";
import { sayInterval, saySigned, TOLD_WORDS } from "@/components/compare-logs/say-comparison";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import { useSize } from "@/components/field-book/use-size";
import type { ComparedRow, ComparisonBody } from "@/lib/schemas/comparison";

export interface DifferenceChartProps {
  body: ComparisonBody;
  row: number | null;
  onRow: (row: number | null) => void;
}

/** What each row did beyond the others: a point, its interval, and a square for the rows that are told. Arrow keys walk the rows. */
export function DifferenceChart({ body, row, onRow }: DifferenceChartProps) {
  const box = useRef<HTMLDivElement>(null);
  const { width, height } = useSize(box);
  const units = useChannelUnits(body.unit, body.channel);
  const { rows } = body;
  const chosen = rows.find((one) => one.row === row);
  const scale = valueScale(rangeOf(rows), Math.max(height, 80), units.factor);
  const onKeyDown = (event: KeyboardEvent) => {
    const by = { ArrowLeft: -1, ArrowRight: 1 }[event.key];
    if (by === undefined) return;
    event.preventDefault();
    onRow(Math.min(rows.length, Math.max(1, (row ?? (by > 0 ? 0 : rows.length + 1)) + by)));
  };
  return (
    <div>
      <div
        ref={box}
        role="listbox"
        tabIndex={0}
        aria-label="Difference of each row beyond the other rows. Left and right arrows choose a row."
        aria-activedescendant={row === null ? undefined : `compared-row-${row}`}
        onKeyDown={onKeyDown}
        className="relative h-60"
      >
        {width > 0 ? (
          <svg width={width} height={height} className="absolute inset-0 block" role="presentation">
            <ValueAxis
              scale={scale}
              width={width}
              title={`After less before, beyond the middle row, ${units.symbol}`}
            />
            <line x1={FRAME.left} x2={width - FRAME.right} y1={scale.y(0)} y2={scale.y(0)} stroke="#1E2430" />
            {rows.map((one) => (
              <RowMark
                key={one.row}
                item={one}
                x={rowMiddle(one.row, rows.length, width)}
                y={scale.y}
                height={height}
                chosen={one.row === row}
                onChoose={() => onRow(one.row === row ? null : one.row)}
              />
            ))}
            <RowAxis rows={rows.map((one) => one.row)} width={width} height={height} />
          </svg>
        ) : null}
      </div>
      <p role="status" className="min-h-[1.4rem] text-table text-ink-soft">
        {chosen
          ? `Row ${chosen.row}: ${saySigned(chosen.beyondOthers, units.format)} beyond the others, 95 % of all rows ${sayInterval(chosen.beyondInterval, units.format)}; ${TOLD_WORDS[chosen.told]}.`
          : "Bars are 95 % for all rows together. A filled square: the row changed beyond the others."}
      </p>
    </div>
  );
}

function rangeOf(rows: readonly ComparedRow[]): [number, number] {
  const values = rows.flatMap(({ beyondOthers, beyondInterval }) => [beyondOthers ?? 0, ...(beyondInterval ?? [])]);
  const [low, high] = [Math.min(0, ...values), Math.max(0, ...values)];
  const margin = (high - low || 1) * 0.06;
  return [low - margin, high + margin];
}

interface RowMarkProps {
  item: ComparedRow;
  x: number;
  y: (value: number) => number;
  height: number;
  chosen: boolean;
  onChoose: () => void;
}

function RowMark({ item, x, y, height, chosen, onChoose }: RowMarkProps) {
  const { row, beyondOthers, beyondInterval, told } = item;
  const isTold = told === "more" || told === "less";
  const words = `Row ${row}${isTold ? `, ${told} than before, beyond the others` : ""}`;
  return (
    <g
      id={`compared-row-${row}`}
      role="option"
      aria-selected={chosen}
      aria-label={words}
      data-row={row}
      onClick={onChoose}
    >
      <title>{words}</title>
      <rect x={x - 8} y={0} width={16} height={height} fill="#2F5D80" fillOpacity={chosen ? 0.16 : 0} />
      {beyondInterval ? (
        <line x1={x} x2={x} y1={y(beyondInterval[0])} y2={y(beyondInterval[1])} stroke="#6B7280" strokeWidth={1.5} />
      ) : null}
      {beyondOthers === null ? null : isTold ? (
        <rect x={x - 4} y={y(beyondOthers) - 4} width={8} height={8} fill="#9A4A2C" data-told={told} />
      ) : (
        <circle cx={x} cy={y(beyondOthers)} r={3} fill="#FFFFFF" stroke="#1E2430" strokeWidth={1.5} />
      )}
    </g>
  );
}
