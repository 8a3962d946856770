import { channelWords } from "@/lib/ingest/channel-quantities";
import type { CellSummary } from "@/lib/ingest/columns/summarise-cells";
import type { ColumnProposal } from "@/lib/ingest/log-format";
import type { NoteBook } from "@/lib/ingest/records/note-book";
import { parseIsoTime } from "@/lib/ingest/records/parse-time";
import { getUnit } from "@/lib/units/unit-table";

/** Says what a person should think about before confirming: nothing is changed but how sure a proposal is. */
export function checkMeanings(
  proposals: readonly (ColumnProposal | null)[],
  summaries: readonly CellSummary[],
  { notes, known }: { notes: NoteBook; known: readonly (ColumnProposal | undefined)[] },
): void {
  if (proposals.some((proposal) => proposal?.channel === "contact")) notes.add("contact-definition");
  proposals.forEach((proposal, index) => {
    if (!proposal) return;
    for (const value of proposal.missing ?? []) {
      notes.add("sentinels-proposed", undefined, `${value} of ${channelWords(proposal.channel)}`);
    }
    const isForce = proposal.channel === "downforce" || proposal.channel === "margin";
    if (isForce && proposal.unit !== null && getUnit(proposal.unit).quantity === "pressure") {
      notes.add("pressure-proposed", undefined, channelWords(proposal.channel));
    }
    const summary = summaries[index];
    if (proposal.unit === "iso8601" && summary?.sample.some((text) => parseIsoTime(text)?.zoned === false)) {
      notes.add("time-names-no-zone");
    }
    if (proposal.unit === "gps-week" && summary?.max != null && summary.max < 1024) notes.add("gps-week-short");
  });
  // A unit that the file states by an identifier of a standard is not doubted.
  const guessed = proposals.map((proposal, index) => (known[index] ? null : proposal));
  doubtNewtons("downforce", { proposals: guessed, summaries, notes });
  doubtNewtons("margin", { proposals: guessed, summaries, notes });
}

/**
 * An opener's downforce is some hundreds to some thousands of newtons; the same in kilograms is a tenth. What is left on
 * a gauge wheel is less, and a light one is no mistake: only the least of all is doubted. (Common practice, no source.)
 */
const LEAST_NEWTONS = { downforce: 400, margin: 150 } as const;
const LEAST_KILOGRAMS = 20;
const FEWEST = 20;

/** Newtons that would be sensible as kilograms: all rows of a channel are looked at together. */
function doubtNewtons(
  channel: keyof typeof LEAST_NEWTONS,
  input: { proposals: readonly (ColumnProposal | null)[]; summaries: readonly CellSummary[]; notes: NoteBook },
): void {
  const { proposals, summaries, notes } = input;
  const inNewtons = proposals.flatMap((proposal, index) =>
    proposal?.channel === channel && proposal.unit === "N" ? [{ proposal, summary: summaries[index] }] : [],
  );
  if (inNewtons.every(({ summary }) => (summary?.filled ?? 0) < FEWEST)) return;
  const largest = Math.max(...inNewtons.map(({ summary }) => summary?.max ?? -Infinity));
  const medians = inNewtons.map(({ summary }) => summary?.median ?? -Infinity);
  if (!(largest < LEAST_NEWTONS[channel] && Math.max(...medians) >= LEAST_KILOGRAMS)) return;
  notes.add("newtons-like-kilograms", undefined, channelWords(channel));
  for (const { proposal } of inNewtons) {
    proposal.confidence = Math.min(proposal.confidence, 0.6);
    proposal.reason += `, but values up to ${largest} are little for newtons and usual for kilograms-force`;
  }
}
