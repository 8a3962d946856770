"use client";

import { useRef, type KeyboardEvent, type PointerEvent } from "react";
import type { ChannelUnits } from "@/components/field-book/use-channel-units";
import { useSize } from "@/components/field-book/use-size";
import { classOf, type Histogram } from "@/lib/legend/class-edges";

export interface HistogramEdgesProps {
  histogram: Histogram;
  edges: readonly number[];
  colours: readonly string[];
  units: ChannelUnits;
  onChange: (edges: number[]) => void;
}

/** Keys move an edge by this part of the whole range; with Shift ten times as far. */
const KEY_STEP = 1 / 200;

/** How far rows went at each value, in class colours; the edges between classes can be dragged or moved by keys. */
export function HistogramEdges({ histogram, edges, colours, units, onChange }: HistogramEdgesProps) {
  const box = useRef<HTMLDivElement>(null);
  const { width, height } = useSize(box);
  const { minimum, maximum } = histogram;
  // Metres say more than readings: a machine that stands logs as often as one that runs.
  const counts = histogram.distancesM ?? histogram.counts;
  const range = maximum - minimum || 1;
  const most = Math.max(...counts) || 1;
  const binWidth = width / counts.length;
  const xOf = (value: number) => ((value - minimum) / range) * width;
  const moveTo = (index: number, value: number) => {
    // An edge stays between its neighbours, so that the classes keep their order.
    const gap = range / 1000;
    const low = (edges[index - 1] ?? minimum - gap) + gap;
    const high = (edges[index + 1] ?? maximum + gap) - gap;
    onChange(edges.map((edge, i) => (i === index ? Math.min(high, Math.max(low, value)) : edge)));
  };
  return (
    <div ref={box} className="relative h-full w-full touch-pan-y border-b border-edge" data-testid="histogram">
      <svg
        width={width}
        height={height}
        className="absolute inset-0"
        role="img"
        aria-label={`${histogram.distancesM ? "Share of distance" : "Number of readings"} at each value, from ${units.format(minimum)} to ${units.format(maximum)}`}
      >
        {counts.map((count, bin) => {
          const value = minimum + ((bin + 0.5) / counts.length) * range;
          // A square root keeps rare values visible beside the common ones.
          const tall = Math.sqrt(count / most) * Math.max(0, height - 6);
          return (
            <rect
              key={bin}
              x={bin * binWidth}
              y={height - tall}
              width={Math.max(0.5, binWidth - 0.5)}
              height={tall}
              fill={colours[classOf(value, edges)]}
              stroke="#1E2430"
              strokeOpacity={0.25}
              strokeWidth={0.5}
            />
          );
        })}
      </svg>
      <div className="pointer-events-none absolute inset-x-0 top-full flex justify-between text-[11px] leading-4 text-ink-soft">
        <span>{units.format(minimum)}</span>
        <span>{histogram.distancesM ? "bars: share of distance" : "bars: readings"}</span>
        <span>{units.format(maximum)}</span>
      </div>
      {edges.map((edge, index) => (
        <EdgeHandle
          key={index}
          index={index}
          left={Math.min(width, Math.max(0, xOf(edge)))}
          value={edge}
          histogram={histogram}
          units={units}
          onMove={(value) => moveTo(index, value)}
        />
      ))}
    </div>
  );
}

interface EdgeHandleProps {
  index: number;
  left: number;
  value: number;
  histogram: Histogram;
  units: ChannelUnits;
  onMove: (value: number) => void;
}

function EdgeHandle({ index, left, value, histogram: { minimum, maximum }, units, onMove }: EdgeHandleProps) {
  const range = maximum - minimum || 1;
  const dragging = useRef(false);
  const onPointerMove = (event: PointerEvent<HTMLElement>) => {
    const box = event.currentTarget.parentElement?.getBoundingClientRect();
    if (!dragging.current || !box || box.width === 0) return;
    onMove(minimum + ((event.clientX - box.left) / box.width) * range);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const by = { ArrowLeft: -1, ArrowDown: -1, ArrowRight: 1, ArrowUp: 1 }[event.key];
    if (by === undefined) return;
    event.preventDefault();
    // Left and right belong to the edge while it has the focus, not to the pass.
    event.stopPropagation();
    onMove(value + by * range * KEY_STEP * (event.shiftKey ? 10 : 1));
  };
  return (
    <div
      role="slider"
      tabIndex={0}
      aria-label={`Class edge ${index + 1}`}
      aria-valuemin={minimum / units.factor}
      aria-valuemax={maximum / units.factor}
      aria-valuenow={value / units.factor}
      aria-valuetext={units.format(value)}
      onKeyDown={onKeyDown}
      onPointerDown={(event) => {
        dragging.current = true;
        event.currentTarget.setPointerCapture(event.pointerId);
      }}
      onPointerMove={onPointerMove}
      onPointerUp={() => {
        dragging.current = false;
      }}
      onPointerCancel={() => {
        dragging.current = false;
      }}
      className="absolute inset-y-0 -ml-2.5 w-5 cursor-ew-resize touch-none"
      style={{ left }}
    >
      <span className="absolute inset-y-0 left-1/2 w-0.5 -translate-x-1/2 bg-ink" />
      <span className="absolute left-1/2 top-0 size-2.5 -translate-x-1/2 rounded-full border-2 border-ink bg-sheet" />
    </div>
  );
}
