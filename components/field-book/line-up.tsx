"use client";

import { LineUpChart } from "@/components/field-book/line-up-chart";
import { ClassSharesChart } from "@/components/field-book/line-up/class-shares-chart";
import { FlagRule } from "@/components/field-book/line-up/flag-rule";
import type { Classes } from "@/components/field-book/use-classes";
import { LineUpPicture } from "@/components/pictures/book-figures";
import { namedCodes } from "@/lib/legend/categories";
import { channelWords } from "@/lib/legend/channel-words";
import type { RowStatisticsBody } from "@/lib/schemas/logs";

export interface LineUpProps {
  statistics: RowStatisticsBody | undefined;
  classes: Classes | null;
  onTable: () => void;
}

const AMOUNTS = "median, middle half, 5th to 95th percentile; z against the other rows; % of distance.";

/** The rows compared: chart, what its marks mean, and the way to the table. */
export function LineUp({ statistics, classes, onTable }: LineUpProps) {
  const isNamed = statistics !== undefined && namedCodes(statistics.channel) > 0;
  return (
    <section aria-labelledby="line-up-title" className="flex h-full min-h-0 flex-col gap-1 px-4 pb-2 pt-3">
      <div className="flex items-baseline justify-between gap-2">
        <h2 id="line-up-title" className="text-section">
          Line-up
        </h2>
        <span className="flex items-center">
          <LineUpPicture classes={classes} />
          <button type="button" onClick={onTable} className="min-h-11 px-1 text-slate underline md:min-h-0">
            As a table
          </button>
        </span>
      </div>
      <p className="text-table text-ink-soft">
        {statistics ? `${channelWords(statistics.channel).name}, ` : ""}left to right looking forward:{" "}
        {isNamed ? "% of the distance of each row under each name." : AMOUNTS}
        {statistics ? <FlagRule statistics={statistics} /> : null}
      </p>
      <div data-figure="line-up" className="h-96 lg:h-auto lg:min-h-0 lg:flex-1">
        {statistics && isNamed ? (
          <ClassSharesChart statistics={statistics} />
        ) : statistics ? (
          <LineUpChart statistics={statistics} classes={classes} />
        ) : (
          <div className="hatch h-full opacity-60" role="status" aria-label="Comparing the rows" />
        )}
      </div>
    </section>
  );
}
