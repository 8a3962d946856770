"use client";

import { useMemo, useState } from "react";
import { CategoryLegend } from "@/components/field-book/category-legend";
import { ClassMenu } from "@/components/field-book/class-menu";
import { EdgeFields } from "@/components/field-book/edge-fields";
import { useBook, useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { HistogramEdges } from "@/components/field-book/histogram-edges";
import { OwnNumbers } from "@/components/field-book/own-numbers";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import type { Classes } from "@/components/field-book/use-classes";
import { useOverview } from "@/components/field-book/use-log-data";
import { channelWords } from "@/lib/legend/channel-words";
import { sharesOfClasses } from "@/lib/legend/value-distribution";

/** What the colours mean: class edges as numbers with the readings behind them, or the names that readings carry. */
export function Legend({ classes, unit }: { classes: Classes | null; unit: string }) {
  const channel = useBookState((state) => state.channel);
  const shares = useMemo(() => {
    const distribution = classes?.context.distribution;
    return distribution ? sharesOfClasses(distribution, classes.edges) : [];
  }, [classes]);
  if (!classes) return <NoLegendYet channel={channel} />;
  const { name, meaning } = channelWords(channel);
  if (classes.categories) {
    return (
      <section aria-label={`Legend: ${name}`} className="flex min-h-[4.25rem] flex-wrap items-start gap-x-5 gap-y-2">
        <div className="w-full min-w-0 md:w-auto md:flex-[1_1_9rem]">
          <h2 className="text-text font-semibold">{name}</h2>
          <p className="text-table text-ink-soft">{meaning}</p>
        </div>
        <div className="w-full min-w-0 md:w-auto md:flex-[5_1_34rem]">
          <CategoryLegend categories={classes.categories} shares={shares} />
        </div>
      </section>
    );
  }
  return <EdgesLegend classes={classes} unit={unit} shares={shares} />;
}

function EdgesLegend({ classes, unit, shares }: { classes: Classes; unit: string; shares: readonly number[] }) {
  const { store } = useBook();
  const { channel } = classes.context;
  const units = useChannelUnits(unit, channel);
  const [isWriting, setIsWriting] = useState(false);
  const onChange = (edges: number[] | null) => store.getState().setEdges(channel, edges);
  const { edges, colours } = classes;
  return (
    <section aria-label={`Legend: ${channelWords(channel).name}`} className="flex flex-wrap items-end gap-x-5 gap-y-2">
      <div className="w-full min-w-0 md:w-auto md:flex-[1_1_9rem]">
        <h2 className="text-text font-semibold">
          {channelWords(channel).name}
          {units.symbol ? <span className="font-normal text-ink-soft">, {units.symbol}</span> : null}
        </h2>
        <ClassMenu classes={classes} unit={unit} onChoose={onChange} onOwnNumbers={() => setIsWriting(true)} />
      </div>
      <div className="mb-4 h-[4.25rem] w-full min-w-0 md:w-auto md:flex-[2_1_14rem]">
        <HistogramEdges
          histogram={classes.context.histogram}
          edges={edges}
          colours={colours}
          units={units}
          onChange={onChange}
        />
      </div>
      <div className="w-full min-w-0 md:w-auto md:flex-[3_1_20rem]">
        {isWriting ? (
          <OwnNumbers edges={edges} units={units} onEdges={onChange} onClose={() => setIsWriting(false)} />
        ) : (
          <EdgeFields edges={edges} colours={colours} shares={shares} units={units} onChange={onChange} />
        )}
      </div>
    </section>
  );
}

/** While readings are counted; or why this log cannot give the channel. */
function NoLegendYet({ channel }: { channel: string }) {
  const { error } = useOverview(useLogVersion(), channel);
  if (error) {
    return (
      <p role="alert" className="min-h-20 text-text text-ink-soft">
        {channelWords(channel).name} cannot be shown. {error.message}
      </p>
    );
  }
  return <div className="hatch h-20 opacity-60" role="status" aria-label="Counting the readings" />;
}
