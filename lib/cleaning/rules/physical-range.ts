import { ruleFacts, type CleaningRule } from "@/lib/cleaning/rule-catalogue";
import type { RuleInput, RuleMask } from "@/lib/cleaning/rule-mask";
import type { ChannelId } from "@/lib/logs/channel";
import type { LogChannel } from "@/lib/logs/machine-log";

interface Range {
  least: number;
  greatest: number;
}

/** Readings outside what their channel can be, where the rule has a range for it in the unit that the log has. */
export function findBeyondRange({ placed }: RuleInput, rule: CleaningRule<"physical-range">): RuleMask {
  const channels = new Map<ChannelId, Uint8Array>();
  for (const channel of placed.log.channels) {
    const range = rangeOf(channel, rule);
    if (range) channels.set(channel.id, markBeyond(channel, placed.passOf, range));
  }
  return { channels };
}

function rangeOf(channel: LogChannel, rule: CleaningRule<"physical-range">): Range | null {
  const chosen = new Map<string, number>(Object.entries(rule).filter(([name]) => name !== "on") as [string, number][]);
  const range = { least: -Infinity, greatest: Infinity };
  let isKnown = false;
  for (const [name, facts] of Object.entries(ruleFacts("physical-range").numbers)) {
    if (facts.channel !== channel.id || facts.unit !== channel.unit) continue;
    isKnown = true;
    if (/^[a-zA-Z]+Min[A-Z]/.test(name)) range.least = chosen.get(name) ?? range.least;
    else range.greatest = chosen.get(name) ?? range.greatest;
  }
  return isKnown ? range : null;
}

// kernel: walks every reading
function markBeyond({ values, rows }: LogChannel, passOf: Int32Array, { least, greatest }: Range): Uint8Array {
  const marks = new Uint8Array(values.length);
  for (let record = 0, at = 0; record < passOf.length; record++) {
    const end = at + rows;
    if (passOf[record] === 0) at = end;
    for (; at < end; at++) if (values[at]! < least || values[at]! > greatest) marks[at] = 1;
  }
  return marks;
}
