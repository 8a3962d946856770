import type { CleaningEffect } from "@/lib/schemas/cleaning";
import { displayUnit, type UnitSystem } from "@/lib/units/display-unit";
import { formatNumber, formatQuantity } from "@/lib/units/format-quantity";
import { channelWords } from "@/lib/legend/channel-words";

type Summary = CleaningEffect["asLogged"];

interface Measure {
  id: keyof Summary;
  words: string;
  kind: "count" | "value" | "share";
}

const MEASURES: readonly Measure[] = [
  { id: "n", words: "Readings", kind: "count" },
  { id: "mean", words: "Mean", kind: "value" },
  { id: "sd", words: "Standard deviation", kind: "value" },
  { id: "p05", words: "5th percentile", kind: "value" },
  { id: "p50", words: "Median", kind: "value" },
  { id: "p95", words: "95th percentile", kind: "value" },
  { id: "shareUnderTarget", words: "Under target, share of distance", kind: "share" },
];

/** One measure of one channel, as logged and with the rules, in the person's units. */
export interface EffectRow {
  id: string;
  channel: string;
  measure: string;
  /** Place in the order of measures, so that a sort can bring it back. */
  unit: string;
  asLogged: number | undefined;
  cleaned: number | undefined;
  change: number | undefined;
  /** The change as a share of what was logged; undefined for shares and where nothing was logged. */
  changeShare: number | undefined;
  /** As shown. */
  words: { asLogged: string; cleaned: string; change: string };
}

/** Every measure of every channel; those that no channel has (a share under a target nobody set) are left out. */
export function effectRows(effects: readonly CleaningEffect[], system: UnitSystem): EffectRow[] {
  return effects.flatMap((effect) =>
    MEASURES.filter(({ id }) => effect.asLogged[id] !== null || effect.cleaned[id] !== null).map((measure) =>
      effectRow(effect, measure, system),
    ),
  );
}

function effectRow(
  { channel, unit, asLogged, cleaned }: CleaningEffect,
  measure: Measure,
  system: UnitSystem,
): EffectRow {
  const siUnit = measure.kind === "value" ? unit : measure.kind === "share" ? "fraction" : "1";
  const shown = displayUnit(siUnit, system, channel);
  const inUnit = (value: number | null) => (value === null ? undefined : Number((value / shown.factor).toPrecision(9)));
  const [before, after] = [asLogged[measure.id], cleaned[measure.id]];
  const change = before === null || after === null ? null : after - before;
  const say = (value: number | null) => {
    if (measure.kind === "count") return value === null ? "–" : formatNumber(value, 0);
    const decimals = measure.kind === "share" ? 1 : Math.max(1, shown.decimals);
    return formatQuantity(value, siUnit, system, { channel, decimals }).text;
  };
  return {
    id: `${channel} ${measure.id}`,
    channel: channelWords(channel).name,
    measure: measure.words,
    unit: shown.symbol,
    asLogged: inUnit(before),
    cleaned: inUnit(after),
    change: inUnit(change),
    changeShare: measure.kind === "share" || !before || change === null ? undefined : change / before,
    words: {
      asLogged: say(before),
      cleaned: say(after),
      change: change !== null && change > 0 ? `+${say(change)}` : say(change),
    },
  };
}
