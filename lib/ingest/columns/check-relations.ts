import {
  medianOf,
  sampledReadings,
  type SampledReadings,
  type SampleSource,
} from "@/lib/ingest/columns/sampled-readings";
import type { ColumnProposal } from "@/lib/ingest/log-format";
import type { NoteBook } from "@/lib/ingest/records/note-book";
import { getUnit } from "@/lib/units/unit-table";

/** A row unit presses with its weight besides; 200 kg of it is more than any carries (common practice, no source). */
const HEAVIEST_UNIT_N = 2000;
const FEWEST = 20;
const [LOST, FULL] = [0.01, 0.99];

/**
 * What columns say of each other. Margin is what is left of downforce and weight, so it cannot exceed them; and a wheel
 * that carries load has contact. Doubts are said, and lower what was proposed.
 */
export function checkRelations(
  proposals: readonly (ColumnProposal | null)[],
  source: SampleSource,
  notes: NoteBook,
): void {
  const readings = sampledReadings(proposals, ["downforce", "margin", "contact"], source).filter(({ isSi }) => isSi);
  const of = (channel: string) => readings.filter((column) => column.channel === channel);
  const margins = of("margin").filter(isForce);
  checkMarginAndForce(pairRows(margins, of("downforce").filter(isForce)), notes);
  checkContact(of("contact"), margins, notes);
}

function isForce({ proposal }: SampledReadings): boolean {
  return proposal.unit !== null && getUnit(proposal.unit).quantity === "force";
}

type Pair = [SampledReadings, SampledReadings];

/** Columns of the same row; one of the whole machine stands beside every row. */
function pairRows(some: readonly SampledReadings[], others: readonly SampledReadings[]): Pair[] {
  return some.flatMap((column) => {
    const partner = others.find(({ row }) => row === column.row) ?? others.find(({ row }) => row === undefined);
    return partner ? [[column, partner] satisfies Pair] : [];
  });
}

function checkMarginAndForce(pairs: readonly Pair[], notes: NoteBook): void {
  const over = pairs.flatMap(([margin, force]) =>
    [...margin.values].map((value, i) => value - (force.values[i] ?? NaN)),
  );
  if (over.filter((value) => !Number.isNaN(value)).length < FEWEST) return;
  const middle = medianOf(over);
  if (!(middle > HEAVIEST_UNIT_N)) return;
  notes.add("margin-above-force");
  const reason = `its values lie ${Math.round(middle)} N above the downforce, more than a row unit weighs`;
  for (const pair of pairs) for (const { proposal } of pair) doubt(proposal, reason);
}

function checkContact(
  contacts: readonly SampledReadings[],
  margins: readonly SampledReadings[],
  notes: NoteBook,
): void {
  const pairs = pairRows(contacts, margins);
  let [agree, contradict] = [0, 0];
  for (const [contact, margin] of pairs) {
    contact.values.forEach((share, i) => {
      const load = margin.values[i] ?? NaN;
      if (Number.isNaN(load) || !(share <= LOST || share >= FULL)) return;
      if (share <= LOST === load <= 0) agree++;
      else contradict++;
    });
  }
  if (contradict < FEWEST || contradict < 0.2 * (agree + contradict)) return;
  const isReversed = contradict > 4 * agree;
  notes.add(isReversed ? "contact-reversed" : "contact-contradicts");
  const reason = isReversed
    ? "it is 0 where the gauge wheel carried load, so it seems to count lost contact"
    : "it does not agree with the load on the gauge wheel";
  // All columns of a channel are read alike, also those without a margin beside them.
  for (const { proposal } of contacts) {
    doubt(proposal, reason);
    if (isReversed) proposal.format = "lost";
  }
}

function doubt(proposal: ColumnProposal, reason: string): void {
  if (proposal.reason.includes(reason)) return;
  proposal.confidence = Math.min(proposal.confidence, 0.5);
  proposal.reason += `; ${reason}`;
}
