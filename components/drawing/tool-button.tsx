"use client";

import type { ReactNode } from "react";
import { classNames } from "@/components/ui/class-names";

export interface ToolButtonProps {
  children: ReactNode;
  onClick: () => void;
  disabled?: boolean;
  /** For a tool that stays in hand. */
  pressed?: boolean;
}

/** One of the tools over a drawing; its name is always written. */
export function ToolButton({ children, onClick, disabled, pressed }: ToolButtonProps) {
  return (
    <button
      type="button"
      onClick={onClick}
      disabled={disabled}
      aria-pressed={pressed}
      className={classNames(
        "inline-flex min-h-11 items-center gap-1.5 rounded border px-2.5 text-table disabled:opacity-50 md:min-h-8",
        pressed ? "border-ink bg-ink text-paper" : "border-edge bg-sheet text-ink hover:border-ink",
      )}
    >
      {children}
    </button>
  );
}
