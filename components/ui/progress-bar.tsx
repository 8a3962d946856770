"use client";

import { Progress } from "radix-ui";

/** How far along something is, 0 to 1; the caller writes the words beside it. */
export function ProgressBar({ share, label }: { share: number; label: string }) {
  const percent = Math.round(Math.min(1, Math.max(0, share)) * 100);
  return (
    <Progress.Root
      value={percent}
      max={100}
      aria-label={label}
      className="h-2 w-full overflow-hidden rounded-[2px] border border-edge bg-sheet"
    >
      <Progress.Indicator className="block h-full bg-straw transition-[width]" style={{ width: `${percent}%` }} />
    </Progress.Root>
  );
}
