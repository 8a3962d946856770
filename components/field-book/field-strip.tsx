"use client";

import { useMemo, useRef, type KeyboardEvent, type PointerEvent } from "react";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { PictureCanvas } from "@/components/field-book/picture-canvas";
import type { Classes } from "@/components/field-book/use-classes";
import { paintGrid } from "@/lib/map-state/paint-pass";
import type { LogOverview } from "@/lib/schemas/logs";

/** The whole field in time order, every pass a thin strip. Dragging over it unrolls pass after pass. */
export function FieldStrip({ overview, classes }: { overview: LogOverview | undefined; classes: Classes | null }) {
  const { store } = useBook();
  const pass = useBookState((state) => state.pass);
  const dragging = useRef(false);
  const picture = useMemo(() => {
    if (!overview || !classes || classes.context.channel !== overview.channel) return null;
    const grid = overview.values.map((line) => Float32Array.from(line, (value) => value ?? NaN));
    return paintGrid(grid, classes.edges, classes.colours);
  }, [overview, classes]);
  const passes = overview?.passes ?? [];
  const columns = overview?.columns || 1;
  const at = passes.findIndex((strip) => strip.pass === pass);
  const current = passes[at];
  const chooseUnder = (event: PointerEvent<HTMLElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    const column = ((event.clientX - box.left) / box.width) * columns;
    const found = passes.find((strip) => column >= strip.from && column < strip.to);
    if (found) store.getState().choosePass(found.pass);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const by = { ArrowLeft: -1, ArrowRight: 1, "[": -1, "]": 1 }[event.key] as 1 | -1 | undefined;
    if (!by) return;
    event.preventDefault();
    store.getState().stepPass(
      by,
      passes.map((strip) => strip.pass),
    );
  };
  return (
    <div
      role="slider"
      tabIndex={0}
      aria-label="Whole field, pass by pass in time order"
      aria-valuemin={1}
      aria-valuemax={Math.max(1, passes.length)}
      aria-valuenow={at + 1}
      aria-valuetext={current ? `Pass ${current.pass}` : "No pass chosen"}
      data-testid="field-strip"
      onKeyDown={onKeyDown}
      onPointerDown={(event) => {
        dragging.current = true;
        event.currentTarget.setPointerCapture(event.pointerId);
        chooseUnder(event);
      }}
      onPointerMove={(event) => {
        if (dragging.current) chooseUnder(event);
      }}
      onPointerUp={() => {
        dragging.current = false;
      }}
      onPointerCancel={() => {
        dragging.current = false;
      }}
      className="hatch relative h-11 cursor-ew-resize touch-pan-y border border-edge bg-sheet md:h-9"
    >
      <PictureCanvas picture={picture} label="Every pass of the field, end to end" />
      <svg className="pointer-events-none absolute inset-0 size-full overflow-visible" aria-hidden="true">
        {passes.slice(1).map((strip) => (
          <line
            key={strip.pass}
            x1={`${(strip.from / columns) * 100}%`}
            x2={`${(strip.from / columns) * 100}%`}
            y1="0"
            y2="100%"
            stroke="#FFFFFF"
            strokeWidth={1}
          />
        ))}
        {current ? (
          <rect
            x={`${(current.from / columns) * 100}%`}
            width={`${((current.to - current.from) / columns) * 100}%`}
            y={-1}
            height="calc(100% + 2px)"
            fill="none"
            stroke="#2F5D80"
            strokeWidth={2.5}
          />
        ) : null}
      </svg>
    </div>
  );
}
