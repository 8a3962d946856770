import { leftOutShare, readingWords, shareWords } from "@/components/cleaning/count-words";
import { classNames } from "@/components/ui/class-names";
import type { Cleaning } from "@/lib/schemas/cleaning";
import { formatNumber } from "@/lib/units/format-quantity";

export interface CleaningTotalsProps {
  total: Cleaning["total"];
  /** True: of rules that are not in force. */
  isDraft: boolean;
  isCounting: boolean;
}

/** How much of the log is kept: one number, one bar, and what was never in a pass. */
export function CleaningTotals({ total, isDraft, isCounting }: CleaningTotalsProps) {
  const { logged, before, after } = total;
  const share = leftOutShare(total);
  const outside = logged - before;
  return (
    <section
      aria-labelledby="cleaning-total-title"
      aria-busy={isCounting}
      className={classNames("max-w-2xl space-y-2", isCounting && "opacity-60")}
      data-testid="cleaning-total"
    >
      <h2 id="cleaning-total-title" className="sr-only">
        How much is kept
      </h2>
      <p className="flex flex-wrap items-baseline gap-x-2">
        <span className="tabular text-number font-semibold">{shareWords(share)}</span>
        <span>
          of the readings in passes {isDraft ? "would be" : "are"} left out: {readingWords(before - after)} of{" "}
          <span className="tabular">{formatNumber(before, 0)}</span>
        </span>
      </p>
      <div className="h-3 border border-edge bg-ink" aria-hidden="true">
        <div className="hatch ml-auto h-full bg-sheet" style={{ width: `${share * 100}%` }} />
      </div>
      <p className="text-table text-ink-soft">
        {formatNumber(after, 0)} kept (dark), {formatNumber(before - after, 0)} left out (hatched).
        {outside > 0
          ? ` Another ${readingWords(outside)} of the file ${outside === 1 ? "was" : "were"} in no pass: without position, or not working.`
          : ""}
      </p>
    </section>
  );
}
