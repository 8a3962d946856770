import type { Seeder } from "@/lib/machines/machine";

/** Rows side by side, from the first to the last, numbered from 1. */
export interface RowSpan {
  first: number;
  last: number;
}

/** How the rows stand on the toolbar, seen from behind, looking forward. */
export interface ToolbarLayout {
  /** Right of the centre line, metres, one a row; even steps of 1 where no machine is known. */
  offsetM: number[];
  /** Ahead of the line of rows, metres. */
  forwardM: number[];
  /** Parts of the frame that rise on their own; one for all rows where the machine does not say. */
  wings: RowSpan[];
  /** Rows switched together; none where the machine does not say. */
  sections: RowSpan[];
  /** Whether the machine is known. */
  known: boolean;
}

type Described = Pick<Seeder, "rowCount" | "rowSpacingM" | "rowOffsetsM" | "rowForwardM" | "sections" | "wings">;

/** The layout of a log's rows. A machine with another number of rows is not the one that made the log. */
export function toolbarLayout(rows: number, machine: Described | null): ToolbarLayout {
  const own = machine?.rowCount === rows ? machine : null;
  const spacingM = own?.rowSpacingM ?? 1;
  const numbers = Array.from({ length: rows }, (_, index) => index);
  return {
    offsetM: own?.rowOffsetsM ?? numbers.map((index) => (index - (rows - 1) / 2) * spacingM),
    forwardM: own?.rowForwardM ?? numbers.map(() => 0),
    wings: own?.wings ? spansOf(own.wings) : [{ first: 1, last: rows }],
    sections: own?.sections ? spansOf(own.sections) : [],
    known: own !== null,
  };
}

function spansOf(counts: readonly number[]): RowSpan[] {
  let next = 1;
  return counts.map((count) => {
    const span = { first: next, last: next + count - 1 };
    next += count;
    return span;
  });
}

/** "left wing", "centre", "right wing" of three; "wing 1" and so on of any other number. */
export function wingWords(index: number, count: number): string {
  if (count === 1) return "whole toolbar";
  if (count === 2) return index === 0 ? "left half" : "right half";
  if (count === 3) return ["left wing", "centre", "right wing"][index] ?? "";
  return `wing ${index + 1}`;
}
