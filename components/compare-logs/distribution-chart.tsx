"use client";

import { scaleLinear } from "d3-scale";
import { useRef } from "react";
import { FRAME } from "@/components/compare-logs/chart-frame";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import { useSize } from "@/components/field-book/use-size";
import type { ComparisonBody } from "@/lib/schemas/comparison";
import { formatNumber } from "@/lib/units/format-quantity";

/** How the distance is spread over values: before above the line, after mirrored below, in the same classes. */
export function DistributionChart({ body }: { body: ComparisonBody }) {
  const box = useRef<HTMLDivElement>(null);
  const { width, height } = useSize(box);
  const units = useChannelUnits(body.unit, body.channel);
  const { edges, before, after } = body.distribution;
  const [first, last] = [edges[0], edges.at(-1)];
  if (first === undefined || last === undefined) return null;
  const most = Math.max(...before, ...after, 0.001);
  const x = scaleLinear([first / units.factor, last / units.factor], [FRAME.left, Math.max(width, 120) - FRAME.right]);
  const [top, floor] = [FRAME.top, Math.max(height, 120) - FRAME.bottom];
  const middle = (top + floor) / 2;
  const tall = (share: number) => (share / most) * ((floor - top) / 2 - 2);
  const xOf = (value: number) => x(value / units.factor);
  return (
    <div ref={box} className="relative h-64">
      {width > 0 ? (
        <svg
          width={width}
          height={height}
          className="absolute inset-0 block"
          role="img"
          aria-label={`Share of the distance by value, before above and after below the line; at most ${percent(most)} in a class.`}
        >
          <g fontSize={11} className="tabular" fill="#4A5261">
            <text x={0} y={12}>
              Share of distance in each class
            </text>
            {[-1, -0.5, 0, 0.5, 1].map((part) => (
              <g key={part}>
                <line
                  x1={FRAME.left}
                  x2={width - FRAME.right}
                  y1={middle - tall(part * most)}
                  y2={middle - tall(part * most)}
                  stroke="#E4E0D5"
                />
                <text x={FRAME.left - 6} y={middle - tall(part * most) + 4} textAnchor="end">
                  {percent(Math.abs(part) * most)}
                </text>
              </g>
            ))}
            {x.ticks(6).map((tick) => (
              <text key={tick} x={x(tick)} y={floor + 14} textAnchor="middle">
                {formatNumber(tick, Number.isInteger(tick) ? 0 : 2)}
              </text>
            ))}
            <text x={(FRAME.left + width - FRAME.right) / 2} y={height - 4} textAnchor="middle">
              Value{units.symbol ? `, ${units.symbol}` : ""}
            </text>
          </g>
          {before.map((share, k) => (
            <Bar
              key={`b${k}`}
              x={xOf(edges[k]!)}
              to={xOf(edges[k + 1]!)}
              y={middle - tall(share)}
              tall={tall(share)}
              fill="#C29A45"
            />
          ))}
          {after.map((share, k) => (
            <Bar
              key={`a${k}`}
              x={xOf(edges[k]!)}
              to={xOf(edges[k + 1]!)}
              y={middle}
              tall={tall(share)}
              fill="#2F5D80"
            />
          ))}
          <line x1={FRAME.left} x2={width - FRAME.right} y1={middle} y2={middle} stroke="#1E2430" />
          <g fontSize={11} fontWeight={600} textAnchor="end">
            <text x={width - FRAME.right} y={top + 12} fill="#7D5A14">
              Before
            </text>
            <text x={width - FRAME.right} y={floor - 6} fill="#2F5D80">
              After
            </text>
          </g>
        </svg>
      ) : null}
    </div>
  );
}

function percent(share: number): string {
  return `${formatNumber(100 * share, share > 0 && share < 0.1 ? 1 : 0)}\u202f%`;
}

function Bar({ x, to, y, tall, fill }: { x: number; to: number; y: number; tall: number; fill: string }) {
  return <rect x={x + 0.5} y={y} width={Math.max(0.5, to - x - 1)} height={tall} fill={fill} />;
}
