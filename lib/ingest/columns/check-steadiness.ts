import { channelWords } from "@/lib/ingest/channel-quantities";
import { sampledReadings, type SampledReadings, type SampleSource } from "@/lib/ingest/columns/sampled-readings";
import type { ColumnProposal } from "@/lib/ingest/log-format";
import type { NoteBook } from "@/lib/ingest/records/note-book";
import type { ChannelId } from "@/lib/logs/channel";

/** Full contact throughout is what a good machine logs, so that channel is left out of what should vary. */
const VARYING: readonly ChannelId[] = [
  "downforce",
  "margin",
  "depth",
  "population",
  "yieldFlow",
  "yieldMass",
  "moisture",
];
/** So few records may agree by chance. */
const FEWEST_AVERAGED = 20;
const FEWEST_STEADY = 50;

/** Says before anything is read that all rows hold one value, or that a column holds the same one throughout the sample. */
export function checkSteadiness(
  proposals: readonly (ColumnProposal | null)[],
  source: SampleSource,
  notes: NoteBook,
): void {
  const readings = sampledReadings(proposals, [...VARYING, "contact"], source);
  for (const channel of new Set(readings.map((column) => column.channel))) {
    const columns = readings.filter((column) => column.channel === channel);
    if (isAveraged(columns)) notes.add("row-averaged", undefined, channelWords(channel));
    if (channel === "contact") continue;
    const steady = columns.filter(({ values }) => isSteady(values));
    if (steady.length === columns.length) notes.add("steady-in-sample", undefined, channelWords(channel));
    else
      for (const { row } of steady) notes.add("row-steady", undefined, `${channelWords(channel)} of row ${row ?? 1}`);
  }
}

function isSteady(values: Float64Array): boolean {
  const filled = values.filter((value) => !Number.isNaN(value));
  return filled.length >= FEWEST_STEADY && filled.every((value) => value === filled[0]);
}

/** All rows agree in every record, and the records differ. */
function isAveraged(columns: readonly SampledReadings[]): boolean {
  const [first] = columns;
  if (!first || columns.length < 2) return false;
  let compared = 0;
  let isVaried = false;
  for (let record = 0; record < first.values.length; record++) {
    const cells = columns.map(({ values }) => values[record] ?? NaN).filter((value) => !Number.isNaN(value));
    if (cells.length < 2) continue;
    if (cells.some((value) => value !== cells[0])) return false;
    compared++;
    isVaried ||= cells[0] !== first.values[0];
  }
  return isVaried && compared >= FEWEST_AVERAGED;
}
