"use client";

import { ChevronDown } from "lucide-react";
import { useMemo } from "react";
import { EdgeFields } from "@/components/field-book/edge-fields";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { HistogramEdges } from "@/components/field-book/histogram-edges";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import type { Classes } from "@/components/field-book/use-classes";
import { Menu, MenuItem, MenuNote } from "@/components/ui/menu";
import { channelWords } from "@/lib/legend/channel-words";
import { type EdgePreset, presetsFor, proposeEdges } from "@/lib/legend/propose-edges";
import { sharesOfClasses } from "@/lib/legend/value-distribution";

const PRESET_WORDS: Record<EdgePreset, string> = {
  target: "Around the target",
  "contact-load": "Published contact loads",
  round: "Round numbers",
  equal: "Equal steps",
  quantile: "As much distance in each",
};

/** What the colours mean: class edges as numbers, with the readings behind them. */
export function Legend({ classes, unit }: { classes: Classes | null; unit: string }) {
  const { store } = useBook();
  const channel = useBookState((state) => state.channel);
  const units = useChannelUnits(unit, channel);
  const shares = useMemo(() => {
    const distribution = classes?.context.distribution;
    return distribution ? sharesOfClasses(distribution, classes.edges) : [];
  }, [classes]);
  if (!classes) return <div className="hatch h-20 opacity-60" role="status" aria-label="Counting the readings" />;
  const onChange = (edges: number[]) => store.getState().setEdges(channel, edges);
  return (
    <section aria-label={`Legend: ${channelWords(channel).name}`} className="flex flex-wrap items-end gap-x-5 gap-y-2">
      <div className="w-full min-w-0 md:w-auto md:flex-[1_1_9rem]">
        <h2 className="text-text font-semibold">
          {channelWords(channel).name}
          {units.symbol ? <span className="font-normal text-ink-soft">, {units.symbol}</span> : null}
        </h2>
        <Presets classes={classes} onChoose={(edges) => store.getState().setEdges(channel, edges)} />
      </div>
      <div className="h-[4.25rem] w-full min-w-0 md:w-auto md:flex-[2_1_14rem]">
        <HistogramEdges
          histogram={classes.context.histogram}
          edges={classes.edges}
          colours={classes.colours}
          units={units}
          onChange={onChange}
        />
      </div>
      <div className="w-full min-w-0 md:w-auto md:flex-[3_1_20rem]">
        <EdgeFields edges={classes.edges} colours={classes.colours} shares={shares} units={units} onChange={onChange} />
      </div>
    </section>
  );
}

function Presets({ classes, onChoose }: { classes: Classes; onChoose: (edges: number[] | null) => void }) {
  const presets = presetsFor(classes.context);
  return (
    <Menu
      trigger={
        <button
          type="button"
          className="inline-flex min-h-11 items-center gap-1 text-table text-slate underline md:min-h-7"
        >
          Classes <ChevronDown size={14} aria-hidden />
        </button>
      }
    >
      {presets.map((preset, index) => (
        <MenuItem key={preset} onSelect={() => onChoose(index === 0 ? null : proposeEdges(preset, classes.context))}>
          {PRESET_WORDS[preset]}
        </MenuItem>
      ))}
      {presets.includes("contact-load") ? (
        <MenuNote>
          Contact loads: light, medium and heavy from 180, 490 and 890{"\u202f"}N.
          <br />
          Hanna, Steward and Aldinger 2010, Appl. Eng. Agric. 26(4).
        </MenuNote>
      ) : null}
    </Menu>
  );
}
