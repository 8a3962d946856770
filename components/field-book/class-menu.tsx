"use client";

import { Check, ChevronDown } from "lucide-react";
import type { Classes } from "@/components/field-book/use-classes";
import { useChangeLegend, useLegends, useOurLegend } from "@/components/field-book/use-legends";
import { Menu, MenuGroup, MenuItem, MenuNote, MenuRule } from "@/components/ui/menu";
import { formatDay } from "@/components/ui/format-date";
import type { EdgesInUse } from "@/lib/legend/name-edges";
import { presetsFor, proposeEdges, type EdgePreset } from "@/lib/legend/propose-edges";

const PRESET_WORDS: Record<EdgePreset, string> = {
  target: "Around the target",
  "contact-load": "Published contact loads",
  round: "Round numbers",
  equal: "Equal steps",
  quantile: "As much distance in each",
  natural: "Natural breaks",
};

function wordsInUse(inUse: EdgesInUse): string {
  if (inUse === "ours") return "Ours";
  return inUse === "own" ? "Own numbers" : PRESET_WORDS[inUse];
}

export interface ClassMenuProps {
  classes: Classes;
  /** SI unit of the channel. */
  unit: string;
  /** Called with the edges to draw in; null for the organisation's, or the channel's default. */
  onChoose: (edges: number[] | null) => void;
  onOwnNumbers: () => void;
}

/** How the classes are made, which way is in use, and the organisation's own. */
export function ClassMenu({ classes, unit, onChoose, onOwnNumbers }: ClassMenuProps) {
  const { context, inUse = "own" } = classes;
  const ours = useOurLegend(context.channel, unit);
  const presets = presetsFor(context);
  const change = useChangeLegend();
  return (
    <>
      <Menu
        trigger={
          <button
            type="button"
            className="inline-flex min-h-11 items-center gap-1 text-left text-table text-slate underline md:min-h-7"
          >
            Classes: {wordsInUse(inUse)} <ChevronDown size={14} className="shrink-0" aria-hidden />
          </button>
        }
      >
        {presets.map((preset, index) => (
          <MenuItem
            key={preset}
            // The default needs no numbers of its own, unless the organisation's stand in its place.
            onSelect={() => onChoose(index === 0 && !ours ? null : proposeEdges(preset, context))}
          >
            <Ticked isOn={inUse === preset}>{PRESET_WORDS[preset]}</Ticked>
          </MenuItem>
        ))}
        <MenuItem onSelect={onOwnNumbers}>
          <Ticked isOn={inUse === "own"}>Own numbers…</Ticked>
        </MenuItem>
        {presets.includes("contact-load") ? (
          <MenuNote>
            Contact loads: light, medium and heavy from 180, 490 and 890{"\u202f"}N.
            <br />
            Hanna, Steward and Aldinger 2010, Appl. Eng. Agric. 26(4).
          </MenuNote>
        ) : null}
        <OurLegend classes={classes} unit={unit} onChoose={onChoose} change={change.mutate} />
      </Menu>
      <LegendNews change={change} />
    </>
  );
}

/** Whether keeping or giving up went well. Stands outside the menu, which is gone by then. */
function LegendNews({ change }: { change: ReturnType<typeof useChangeLegend> }) {
  if (change.isError) {
    return (
      <p role="alert" className="text-table text-clay">
        The legend was not kept: {change.error.message}
      </p>
    );
  }
  return (
    <p role="status" className="text-table text-ink-soft">
      {change.isSuccess ? (change.variables.edges ? "Saved for everyone here." : "Given up for everyone here.") : ""}
    </p>
  );
}

/** Everyone's legend of the channel: use it, make it, give it up. Nothing where there is none and the person may make none. */
function OurLegend({
  classes,
  unit,
  onChoose,
  change,
}: Pick<ClassMenuProps, "classes" | "unit" | "onChoose"> & { change: ReturnType<typeof useChangeLegend>["mutate"] }) {
  const { channel } = classes.context;
  const ours = useOurLegend(channel, unit);
  const { data } = useLegends();
  const mayChange = data?.changeable === true;
  if (!ours && !mayChange) return null;
  const save = () => change({ channel, unit, edges: [...classes.edges] }, { onSuccess: () => onChoose(null) });
  return (
    <>
      <MenuRule />
      <MenuGroup title="For everyone here, on every field">
        {ours ? (
          <MenuItem onSelect={() => onChoose(null)}>
            <Ticked isOn={classes.inUse === "ours"}>Use ours</Ticked>
          </MenuItem>
        ) : null}
        {mayChange && classes.inUse !== "ours" ? (
          <MenuItem onSelect={save}>
            <Ticked isOn={false}>Save for everyone here</Ticked>
          </MenuItem>
        ) : null}
        {mayChange && ours ? (
          <MenuItem onSelect={() => change({ channel, unit, edges: null })}>
            <Ticked isOn={false}>Give ours up</Ticked>
          </MenuItem>
        ) : null}
      </MenuGroup>
      {ours ? (
        <MenuNote>
          Ours: saved {ours.savedBy ? `by ${ours.savedBy.name} ` : ""}on {formatDay(ours.savedAt)}.
        </MenuNote>
      ) : null}
    </>
  );
}

function Ticked({ isOn, children }: { isOn: boolean; children: React.ReactNode }) {
  return (
    <span className="flex items-center gap-2">
      <Check size={14} className={isOn ? "" : "invisible"} aria-hidden />
      {children}
      {isOn ? <span className="sr-only"> (in use)</span> : null}
    </span>
  );
}
