"use client";

import { ticks } from "d3-array";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import type { PassScale } from "@/components/field-book/pass-scale";
import { pickLabels } from "@/lib/legend/pick-labels";
import { formatNumber } from "@/lib/units/format-quantity";

/** Numbers stand at least this far apart. */
const LABEL_PX = 72;

/** Distance along the pass, in the person's unit, under or beside the picture. */
export function DistanceAxis({ scale }: { scale: PassScale }) {
  const { factor, symbol } = useChannelUnits("m", "distance");
  const across = scale.orientation === "across";
  const lengthPx = across ? scale.width : scale.height;
  if (lengthPx === 0 || !(scale.lengthM > 0)) return null;
  const shownLength = scale.lengthM / factor;
  const marks = ticks(0, shownLength, Math.max(2, Math.floor(lengthPx / LABEL_PX)));
  return (
    <div aria-hidden="true" className={across ? "relative h-5" : "relative w-11"}>
      {marks.map((mark) => {
        const at = (mark / shownLength) * lengthPx;
        const last = at > lengthPx - 48;
        const text = mark === 0 ? `0\u202f${symbol}` : formatNumber(mark, Number.isInteger(mark) ? 0 : 1);
        return (
          <span
            key={mark}
            className={`tabular absolute text-[11px] leading-4 text-ink-soft ${across && mark > 0 ? (last ? "-translate-x-full" : "-translate-x-1/2") : ""} ${across ? "top-0.5" : "right-1 -translate-y-1/2"}`}
            style={across ? { left: at } : { top: Math.max(8, at) }}
          >
            {text}
          </span>
        );
      })}
    </div>
  );
}

/** Row numbers on the picture's edge; rows that stand out carry a clay square, the selected one is bold. */
export function RowAxis({
  scale,
  selected,
  flagged,
}: {
  scale: PassScale;
  selected: number | null;
  flagged: number[];
}) {
  const across = scale.orientation === "across";
  const rowPx = (across ? scale.height : scale.width) / (scale.rows || 1);
  const least = across ? 14 : 22;
  const every = [1, 2, 4, 6, 8, 12, 24].find((step) => step * rowPx >= least) ?? 48;
  const shown = (row: number) =>
    row === selected || flagged.includes(row) || row === 1 || row === scale.rows || row % every === 0;
  const rows = Array.from({ length: scale.rows }, (_, index) => index + 1).filter(shown);
  const weightOf = (row: number) =>
    row === selected ? 3 : flagged.includes(row) ? 2 : row === 1 || row === scale.rows ? 1 : 0;
  // A plain number gives way to a selected or flagged one beside it, and to the first and last.
  const kept = pickLabels(
    rows.map((row) => ({ row, weight: weightOf(row) })),
    { rowPx, leastPx: least },
  );
  return (
    <div aria-hidden="true" className={across ? "relative w-9" : "relative ml-11 h-5"}>
      {kept.map((row) => (
        <span
          key={row}
          className={`tabular absolute flex items-center gap-1 text-[11px] leading-4 ${across ? "right-1.5 -translate-y-1/2" : "-translate-x-1/2"} ${row === selected ? "font-semibold text-slate" : "text-ink-soft"}`}
          style={across ? { top: (row - 0.5) * rowPx } : { left: (row - 0.5) * rowPx }}
        >
          {flagged.includes(row) ? <span className="size-1.5 bg-clay" /> : null}
          {row}
        </span>
      ))}
    </div>
  );
}
