"use client";

import { ChevronsLeftRight } from "lucide-react";
import type { KeyboardEvent, PointerEvent } from "react";

/** Percent a step by keys, and with Shift held. */
const STEP_PERCENT = 2;
const LONG_STEP_PERCENT = 10;

export interface DividerProps {
  /** Where it stands, percent of the width from the left. */
  atPercent: number;
  onMove: (atPercent: number) => void;
  /** What lies left and right of it. */
  sides: [left: string, right: string];
}

/** The line between two maps over each other: dragged, or moved by arrows, Home and End. */
export function Divider({ atPercent, onMove, sides }: DividerProps) {
  const moveTo = (percent: number) => onMove(Math.min(100, Math.max(0, Math.round(percent))));
  const onKeyDown = (event: KeyboardEvent) => {
    const step = event.shiftKey ? LONG_STEP_PERCENT : STEP_PERCENT;
    const places: Record<string, number | undefined> = {
      ArrowLeft: atPercent - step,
      ArrowDown: atPercent - step,
      ArrowRight: atPercent + step,
      ArrowUp: atPercent + step,
      Home: 0,
      End: 100,
    };
    const place = places[event.key];
    if (place === undefined) return;
    event.preventDefault();
    moveTo(place);
  };
  const follow = (event: PointerEvent<HTMLElement>) => {
    if (!event.currentTarget.hasPointerCapture(event.pointerId)) return;
    const box = event.currentTarget.parentElement!.getBoundingClientRect();
    moveTo(((event.clientX - box.left) / box.width) * 100);
  };
  return (
    <div
      role="slider"
      tabIndex={0}
      aria-label="Divider between the two maps"
      aria-valuemin={0}
      aria-valuemax={100}
      aria-valuenow={atPercent}
      aria-valuetext={`${sides[0]} on ${atPercent} %, ${sides[1]} on ${100 - atPercent} %`}
      onKeyDown={onKeyDown}
      onPointerDown={(event) => {
        event.currentTarget.setPointerCapture(event.pointerId);
        event.currentTarget.focus();
      }}
      onPointerMove={follow}
      style={{ left: `${atPercent}%` }}
      className="no-print absolute inset-y-0 z-10 w-4 -translate-x-1/2 cursor-ew-resize touch-none"
    >
      <span className="absolute inset-y-0 left-1/2 w-1.5 -translate-x-1/2 border-x border-ink bg-sheet" />
      <span className="absolute left-1/2 top-1/2 grid size-11 -translate-x-1/2 -translate-y-1/2 place-items-center rounded-full border border-ink bg-sheet md:size-9">
        <ChevronsLeftRight size={18} aria-hidden />
      </span>
    </div>
  );
}
