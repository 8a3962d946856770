"use client";

import { useId } from "react";
import { sayDelay } from "@/components/cleaning/say-delay";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import { scaleLinear } from "d3-scale";
import type { ChannelDelay } from "@/lib/schemas/alignment";
import { formatNumber } from "@/lib/units/format-quantity";

const BOX = { width: 360, height: 170, left: 46, right: 10, top: 26, bottom: 34 } as const;

/** How much neighbouring passes differ at each delay tried: the lower, the better they fit. Least at the delay that fits best. */
export function DelayCurve({ item }: { item: ChannelDelay }) {
  const titleId = useId();
  const { symbol, factor, format } = useChannelUnits(item.unit, item.channel);
  // The mean square is hard to picture; its root is a difference in the channel's own unit.
  const points = item.curve.map(({ delayS, j }) => ({ delayS, difference: Math.sqrt(j) }));
  if (points.length < 2) return null;
  const delays = points.map(({ delayS }) => delayS);
  const differences = points.map(({ difference }) => difference / factor);
  const x = scaleLinear([Math.min(...delays), Math.max(...delays)], [BOX.left, BOX.width - BOX.right]);
  const y = scaleLinear([Math.min(...differences), Math.max(...differences)], [BOX.height - BOX.bottom, BOX.top]).nice(
    4,
  );
  // As many decimals as tell one tick from the next.
  const formatTick = y.tickFormat(4);
  const best = points.reduce((least, point) => (point.difference < least.difference ? point : least));
  const line = points.map(({ delayS, difference }) => `${x(delayS)},${y(difference / factor)}`).join(" ");
  const [from, to] = item.delayIntervalS ?? [NaN, NaN];
  return (
    <svg
      viewBox={`0 0 ${BOX.width} ${BOX.height}`}
      className="tabular w-full max-w-md text-[11px]"
      role="img"
      aria-labelledby={titleId}
    >
      <title id={titleId}>
        {`Usual difference between neighbouring passes by delay: least, ${format(best.difference)}, at ${sayDelay(best.delayS)}.`}
      </title>
      {Number.isFinite(from) ? (
        <rect
          x={x(from)}
          width={Math.max(2, x(to) - x(from))}
          y={BOX.top}
          height={BOX.height - BOX.top - BOX.bottom}
          fill="#C29A45"
          fillOpacity={0.3}
        />
      ) : null}
      {y.ticks(4).map((tick) => (
        <g key={tick}>
          <line x1={BOX.left} x2={BOX.width - BOX.right} y1={y(tick)} y2={y(tick)} stroke="#E4E0D5" />
          <text x={BOX.left - 6} y={y(tick) + 4} textAnchor="end" fill="#4A5261">
            {formatTick(tick)}
          </text>
        </g>
      ))}
      {x.ticks(6).map((tick) => (
        <text key={tick} x={x(tick)} y={BOX.height - BOX.bottom + 14} textAnchor="middle" fill="#4A5261">
          {formatNumber(tick, 0)}
        </text>
      ))}
      <polyline points={line} fill="none" stroke="#1E2430" strokeWidth={1.5} />
      {item.delayS === null ? null : <Mark x={x(item.delayS)} dashed={false} />}
      {item.applied ? <Mark x={x(item.applied)} dashed /> : null}
      <text x={(BOX.left + BOX.width - BOX.right) / 2} y={BOX.height - 4} textAnchor="middle" fill="#4A5261">
        Delay tried, s
      </text>
      <text x={2} y={12} fill="#4A5261">
        Usual difference{symbol ? `, ${symbol}` : ""}
      </text>
    </svg>
  );
}

function Mark({ x, dashed }: { x: number; dashed: boolean }) {
  return (
    <line
      x1={x}
      x2={x}
      y1={BOX.top}
      y2={BOX.height - BOX.bottom}
      stroke="#2F5D80"
      strokeWidth={2}
      strokeDasharray={dashed ? "4 3" : undefined}
    />
  );
}
