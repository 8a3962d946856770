"use client";

import { ChevronLeft, ChevronRight } from "lucide-react";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import type { ReactNode } from "react";
import type { PassBody } from "@/lib/schemas/logs";

/** Which pass is unrolled, with steps to the one before and after. */
export function PassHeading({ passes, tools }: { passes: readonly PassBody[]; tools?: ReactNode }) {
  const { store } = useBook();
  const pass = useBookState((state) => state.pass);
  const distance = useChannelUnits("m", "distance");
  const at = passes.findIndex((candidate) => candidate.pass === pass);
  const current = passes[at];
  const numbers = passes.map((candidate) => candidate.pass);
  return (
    <div className="flex items-center gap-1">
      <h2 className="text-text font-semibold">
        {current ? `Pass ${current.pass}` : "Unrolled pass"}
        <span className="font-normal text-ink-soft">
          {current
            ? ` of ${passes.length} · ${distance.format(current.lengthM)} · ${courseWords(current.headingDeg)}`
            : ""}
          {current?.headland ? " · headland" : ""}
        </span>
      </h2>
      <Step label="Pass before" disabled={at <= 0} onClick={() => store.getState().stepPass(-1, numbers)}>
        <ChevronLeft size={18} aria-hidden />
      </Step>
      <Step
        label="Pass after"
        disabled={at < 0 || at >= passes.length - 1}
        onClick={() => store.getState().stepPass(1, numbers)}
      >
        <ChevronRight size={18} aria-hidden />
      </Step>
      {tools}
    </div>
  );
}

const POINTS = ["north", "north-east", "east", "south-east", "south", "south-west", "west", "north-west"];

/** "driven north-east, 52°". */
export function courseWords(headingDeg: number): string {
  const turn = ((headingDeg % 360) + 360) % 360;
  return `driven ${POINTS[Math.round(turn / 45) % 8]}, ${Math.round(turn) % 360}°`;
}

interface StepProps {
  label: string;
  disabled: boolean;
  onClick: () => void;
  children: React.ReactNode;
}

function Step({ label, disabled, onClick, children }: StepProps) {
  return (
    <button
      type="button"
      aria-label={label}
      title={label}
      disabled={disabled}
      onClick={onClick}
      className="grid size-11 place-items-center rounded text-ink hover:bg-sheet disabled:text-rule md:size-7"
    >
      {children}
    </button>
  );
}
