"use client";

import { useRef } from "react";
import { RowAxis, rowMiddle, ValueAxis, valueScale } from "@/components/compare-logs/chart-frame";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import { useSize } from "@/components/field-book/use-size";
import type { ComparedRow, ComparedRowSide, ComparisonBody } from "@/lib/schemas/comparison";

export interface ComparedLineUpsProps {
  body: ComparisonBody;
  row: number | null;
}

/** The rows of both logs as they stand on the toolbar, side by side on one scale. */
export function ComparedLineUps({ body, row }: ComparedLineUpsProps) {
  const range = rangeOf(body.rows);
  if (!range) return null;
  return (
    <div className="grid gap-4 md:grid-cols-2">
      {(["before", "after"] as const).map((side) => (
        <figure key={side} className="min-w-0">
          <figcaption className="truncate font-semibold">
            {side === "before" ? "Before" : "After"}: {body[side].name}
          </figcaption>
          <LineUpPanel body={body} side={side} range={range} row={row} />
        </figure>
      ))}
    </div>
  );
}

function rangeOf(rows: readonly ComparedRow[]): [number, number] | null {
  const values = rows.flatMap(({ before, after }) => [before.p05, before.p95, after.p05, after.p95]);
  const known = values.filter((value) => value !== null);
  if (known.length === 0) return null;
  const [low, high] = [Math.min(...known), Math.max(...known)];
  const margin = (high - low || 1) * 0.05;
  return [low - margin, high + margin];
}

interface PanelProps extends ComparedLineUpsProps {
  side: "before" | "after";
  range: [number, number];
}

function LineUpPanel({ body, side, range, row }: PanelProps) {
  const box = useRef<HTMLDivElement>(null);
  const { width, height } = useSize(box);
  const units = useChannelUnits(body.unit, body.channel);
  const scale = valueScale(range, Math.max(height, 80), units.factor);
  const { rows } = body;
  return (
    <div ref={box} className="relative h-64">
      {width > 0 ? (
        <svg
          width={width}
          height={height}
          className="absolute inset-0 block"
          role="img"
          aria-label={`Line-up ${side}: median, middle half and 5th to 95th percentile of ${rows.length} rows. The table below has the numbers.`}
        >
          <ValueAxis scale={scale} width={width} title={units.symbol} />
          {rows.map((one) => (
            <Box
              key={one.row}
              figures={one[side]}
              x={rowMiddle(one.row, rows.length, width)}
              y={scale.y}
              halfPx={Math.max(1.5, Math.min(7, (width / rows.length) * 0.3))}
              lit={one.row === row}
            />
          ))}
          <RowAxis rows={rows.map((one) => one.row)} width={width} height={height} />
        </svg>
      ) : null}
    </div>
  );
}

interface BoxProps {
  figures: ComparedRowSide;
  x: number;
  y: (value: number) => number;
  halfPx: number;
  lit: boolean;
}

function Box({ figures: { p05, p25, p50, p75, p95 }, x, y, halfPx, lit }: BoxProps) {
  if (p05 === null || p25 === null || p50 === null || p75 === null || p95 === null) return null;
  return (
    <g>
      <line x1={x} x2={x} y1={y(p95)} y2={y(p05)} stroke="#6B7280" />
      <rect
        x={x - halfPx}
        y={y(p75)}
        width={2 * halfPx}
        height={Math.max(2, y(p25) - y(p75))}
        fill={lit ? "#2F5D80" : "#E4E0D5"}
        stroke="#1E2430"
        strokeWidth={0.75}
      />
      <line
        x1={x - halfPx - 1}
        x2={x + halfPx + 1}
        y1={y(p50)}
        y2={y(p50)}
        stroke={lit ? "#FFFFFF" : "#1E2430"}
        strokeWidth={2}
      />
    </g>
  );
}
