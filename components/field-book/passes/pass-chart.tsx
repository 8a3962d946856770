"use client";

import { extent } from "d3-array";
import { useRef, type KeyboardEvent } from "react";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { ValueAxis } from "@/components/field-book/passes/value-axis";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import { useSize } from "@/components/field-book/use-size";
import type { PassStatisticsBody, PassStatisticsItem } from "@/lib/schemas/pass-figures";

const LEFT_PX = 46;
const TOP_PX = 16;
/** Pass numbers, and above them whether a pass is headland and which way it went. */
const FOOT_PX = 34;

interface PassPlot {
  height: number;
  floor: number;
  passPx: number;
  xOf: (index: number) => number;
  yOf: (value: number) => number;
}

/** Every pass in the order it was driven: median, middle half, 5th to 95th percentile. A click or Enter unrolls it. */
export function PassChart({ statistics }: { statistics: PassStatisticsBody }) {
  const box = useRef<HTMLDivElement>(null);
  const { width, height } = useSize(box);
  const { store } = useBook();
  const chosen = useBookState((state) => state.pass);
  const units = useChannelUnits(statistics.unit, statistics.channel);
  const { items } = statistics;
  const numbers = items.map(({ pass }) => pass);
  const [low = 0, high = 0] = extent(items.flatMap(({ p05, p95 }) => [p05, p95]).filter((value) => value !== null));
  const margin = (high - low || 1) * 0.06;
  const floor = height - FOOT_PX;
  const passPx = (width - LEFT_PX - 6) / (items.length || 1);
  const plot: PassPlot = {
    height,
    floor,
    passPx,
    xOf: (index) => LEFT_PX + (index + 0.5) * passPx,
    yOf: (value) => TOP_PX + ((high + margin - value) / (high - low + 2 * margin)) * (floor - TOP_PX),
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const by = ({ ArrowLeft: -1, ArrowRight: 1 } as const)[event.key as "ArrowLeft" | "ArrowRight"];
    if (by === undefined) return;
    event.preventDefault();
    store.getState().stepPass(by, numbers);
  };
  return (
    <div
      ref={box}
      role="listbox"
      tabIndex={0}
      aria-label="Passes in the order they were driven. Left and right arrows unroll the one before or after."
      aria-activedescendant={chosen === null ? undefined : `pass-chart-${chosen}`}
      onKeyDown={onKeyDown}
      className="relative h-full min-h-0"
    >
      {width > 0 ? (
        <svg width={width} height={height} className="absolute inset-0 block" role="presentation">
          <text x={0} y={10} fontSize={11} fill="#4A5261">
            {units.symbol}
          </text>
          <ValueAxis low={low} high={high} units={units} yOf={plot.yOf} left={LEFT_PX} right={width} />
          {items.map((item, index) => (
            <PassMark
              key={item.pass}
              item={item}
              index={index}
              plot={plot}
              chosen={item.pass === chosen}
              onChoose={() => store.getState().choosePass(item.pass)}
            />
          ))}
          <PassNumbers items={items} plot={plot} chosen={chosen} />
        </svg>
      ) : null}
    </div>
  );
}

interface PassMarkProps {
  item: PassStatisticsItem;
  index: number;
  plot: PassPlot;
  chosen: boolean;
  onChoose: () => void;
}

function PassMark({ item, index, plot, chosen, onChoose }: PassMarkProps) {
  const { p05, p25, p50, p75, p95 } = item;
  const { xOf, yOf, passPx, floor, height } = plot;
  const x = xOf(index);
  const wide = Math.max(1.5, Math.min(14, passPx * 0.66));
  const words = `Pass ${item.pass}${item.headland ? ", headland" : ""}`;
  return (
    <g
      id={`pass-chart-${item.pass}`}
      role="option"
      aria-selected={chosen}
      aria-label={words}
      data-pass={item.pass}
      onClick={onChoose}
      className="cursor-pointer"
    >
      <title>{words}</title>
      <rect x={x - passPx / 2} y={0} width={passPx} height={height} fill="#1E2430" fillOpacity={0} />
      {p05 !== null && p25 !== null && p50 !== null && p75 !== null && p95 !== null ? (
        <g>
          <line x1={x} x2={x} y1={yOf(p95)} y2={yOf(p05)} stroke="#6B7280" strokeWidth={passPx < 4 ? 0.5 : 1} />
          <rect
            x={x - wide / 2}
            y={yOf(p75)}
            width={wide}
            height={Math.max(1, yOf(p25) - yOf(p75))}
            fill={item.headland ? "#FFFFFF" : "#C29A45"}
            stroke="#1E2430"
            strokeWidth={passPx < 4 ? 0.25 : 0.75}
          />
          <line
            x1={x - wide / 2 - 0.5}
            x2={x + wide / 2 + 0.5}
            y1={yOf(p50)}
            y2={yOf(p50)}
            stroke="#1E2430"
            strokeWidth={2}
          />
        </g>
      ) : null}
      {item.headingDeg !== null && passPx >= 5 ? (
        <path
          d="M0 -5V5M-3 -2L0 -5L3 -2"
          transform={`translate(${x} ${floor + 10}) scale(${Math.min(1, passPx / 12)}) rotate(${item.headingDeg})`}
          fill="none"
          stroke="#4A5261"
        />
      ) : null}
      {chosen ? (
        <rect
          x={x - Math.max(2, passPx / 2)}
          y={1}
          width={Math.max(4, passPx)}
          height={height - 2}
          fill="none"
          stroke="#2F5D80"
          strokeWidth={2}
        />
      ) : null}
    </g>
  );
}

interface PassNumbersProps {
  items: readonly PassStatisticsItem[];
  plot: PassPlot;
  chosen: number | null;
}

function PassNumbers({ items, plot, chosen }: PassNumbersProps) {
  const every = [1, 2, 5, 10, 20, 50, 100].find((step) => step * plot.passPx >= 26) ?? 200;
  const isShown = (pass: number) =>
    pass === chosen || (pass % every === 0 && Math.abs(pass - (chosen ?? -1e9)) * plot.passPx > 22);
  return (
    <g fontSize={11} textAnchor="middle" className="tabular pointer-events-none">
      {items.map(({ pass }, index) =>
        isShown(pass) ? (
          <text
            key={pass}
            x={plot.xOf(index)}
            y={plot.height - 4}
            fill={pass === chosen ? "#2F5D80" : "#4A5261"}
            fontWeight={pass === chosen ? 600 : 400}
          >
            {pass}
          </text>
        ) : null,
      )}
    </g>
  );
}
