import { checkPositions } from "@/lib/ingest/columns/check-positions";
import { checkMotion } from "@/lib/ingest/columns/check-motion";
import { checkRelations } from "@/lib/ingest/columns/check-relations";
import { checkSteadiness } from "@/lib/ingest/columns/check-steadiness";
import { checkMeanings } from "@/lib/ingest/columns/check-meanings";
import { describeProposal } from "@/lib/ingest/columns/describe-column";
import { guessColumns } from "@/lib/ingest/columns/guess-columns";
import { hintColumns } from "@/lib/ingest/columns/hint-columns";
import { offerSystems } from "@/lib/ingest/columns/offer-systems";
import { summariseCells } from "@/lib/ingest/columns/summarise-cells";
import type { ColumnProposal, CrsCandidate, FoundColumn, InspectOptions } from "@/lib/ingest/log-format";
import type { LogShape } from "@/lib/ingest/mapping";
import { isMissing } from "@/lib/ingest/records/parse-number";
import type { NoteBook } from "@/lib/ingest/records/note-book";

export interface SampledColumns {
  names: readonly string[];
  units: readonly string[] | null;
  /** Sampled cells of a column, as texts. */
  cells(field: number): string[];
  decimalComma: boolean;
  near: InspectOptions["near"];
  notes: NoteBook;
  /** Where the file itself names the system of its easting and northing. */
  crs?: string;
  /** Meanings the file itself states; undefined where only the header and the values tell. */
  known?: readonly (ColumnProposal | undefined)[];
}

/** The columns of a file with what they hold and seem to mean. Same for every format. */
export function describeFoundColumns(sampled: SampledColumns): {
  columns: FoundColumn[];
  shape: LogShape;
  crsCandidates?: CrsCandidate[];
  example?: string[];
} {
  const { names, units, decimalComma } = sampled;
  const texts = names.map((_, field) => sampled.cells(field));
  const sample = { cells: (field: number) => texts[field] ?? [], decimalComma };
  const summaries = texts.map((cells) => summariseCells(cells, decimalComma));
  const evidence = names.flatMap((name, field) => {
    const summary = summaries[field];
    return summary ? [{ name, unitCell: units?.[field] ?? null, summary }] : [];
  });
  const { proposals, shape } = guessColumns(evidence, sampled.known);
  checkPositions(proposals, summaries, sampled);
  checkMeanings(proposals, summaries, { notes: sampled.notes, known: sampled.known ?? [] });
  if (shape !== "long") checkSteadiness(proposals, sample, sampled.notes);
  checkRelations(proposals, sample, sampled.notes);
  checkMotion(proposals, sample, sampled.notes);
  const crsCandidates = sampled.crs === undefined ? offerSystems(proposals, summaries, sampled) : [];
  sampled.notes.set("unknown-unit", proposals.filter((proposal) => proposal?.unit === null).length);
  const hints = hintColumns(evidence, proposals);
  const columns = evidence.map(({ name, summary }, index) => {
    const proposal = proposals[index] ?? null;
    const { sample, min, max } = summary;
    const words = describeProposal({ name, sample }, proposal, { decimalComma });
    const hint = hints[index];
    return { name, index, sample, min, max, proposal, ...(hint ? { hint } : {}), words };
  });
  const example = chooseExample(texts);
  return { columns, shape, ...(example ? { example } : {}), ...(crsCandidates.length === 0 ? {} : { crsCandidates }) };
}

/** Cells of the first record that lacks fewest; null of none. */
function chooseExample(texts: readonly string[][]): string[] | null {
  const records = Math.max(0, ...texts.map((cells) => cells.length));
  let [best, most] = [-1, -1];
  for (let record = 0; record < records && most < texts.length; record++) {
    const filled = texts.filter((cells) => !isMissing(cells[record] ?? "")).length;
    if (filled > most) [best, most] = [record, filled];
  }
  return best < 0 ? null : texts.map((cells) => (cells[best] ?? "").slice(0, 200));
}
