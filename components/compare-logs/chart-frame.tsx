import { scaleLinear, type ScaleLinear } from "d3-scale";
import { formatNumber } from "@/lib/units/format-quantity";

export const FRAME = { left: 52, right: 8, top: 24, bottom: 34 } as const;

export interface ValueScale {
  /** Pixels of a value in SI. */
  y: (valueSi: number) => number;
  ticks: { y: number; text: string }[];
}

/** A scale of values in shown units, upwards, over `range` in SI. */
export function valueScale([low, high]: readonly [number, number], height: number, factor: number): ValueScale {
  const scale = scaleLinear([low / factor, high / factor], [height - FRAME.bottom, FRAME.top]);
  return { y: (value) => scale(value / factor), ticks: ticksOf(scale, Math.max(2, Math.floor(height / 46))) };
}

function ticksOf(scale: ScaleLinear<number, number>, count: number): ValueScale["ticks"] {
  const values = scale.ticks(count);
  const step = (values[1] ?? 1) - (values[0] ?? 0);
  const decimals = Math.max(0, -Math.floor(Math.log10(step || 1) + 1e-9));
  return values.map((value) => ({ y: scale(value), text: formatNumber(value, decimals) }));
}

export interface ValueAxisProps {
  scale: ValueScale;
  width: number;
  title: string;
}

/** Lines and numbers of a scale of values, with what it measures and its unit above. */
export function ValueAxis({ scale, width, title }: ValueAxisProps) {
  return (
    <g fontSize={11} className="tabular">
      <text x={0} y={12} fill="#4A5261">
        {title}
      </text>
      {scale.ticks.map(({ y, text }) => (
        <g key={text}>
          <line x1={FRAME.left} x2={width - FRAME.right} y1={y} y2={y} stroke="#E4E0D5" />
          <text x={FRAME.left - 6} y={y + 4} textAnchor="end" fill="#4A5261">
            {text}
          </text>
        </g>
      ))}
    </g>
  );
}

/** Numbers of rows under a chart, thinned until they have room. */
export function RowAxis({ rows, width, height }: { rows: readonly number[]; width: number; height: number }) {
  const rowPx = (width - FRAME.left - FRAME.right) / (rows.length || 1);
  const every = [1, 2, 4, 6, 8, 12, 24].find((step) => step * rowPx >= 22) ?? 48;
  return (
    <g fontSize={11} className="tabular" fill="#4A5261" textAnchor="middle">
      {rows
        .filter((row) => row === 1 || row % every === 0)
        .map((row) => (
          <text key={row} x={rowMiddle(row, rows.length, width)} y={height - FRAME.bottom + 14}>
            {row}
          </text>
        ))}
      <text x={(FRAME.left + width - FRAME.right) / 2} y={height - 4}>
        Row, left to right looking forward
      </text>
    </g>
  );
}

/** Pixels of the middle of a row (from 1). */
export function rowMiddle(row: number, rows: number, width: number): number {
  return FRAME.left + ((row - 0.5) / rows) * (width - FRAME.left - FRAME.right);
}
