import { Z_LIMIT, type RowScores } from "@/lib/statistics/row-deviation";

export interface ReasonInput {
  scores: RowScores;
  /** Row index from 0. */
  row: number;
  flagged: boolean[];
  medianOfRows: number;
  unit: string;
}

/** Three or more flagged rows side by side are more likely one cause across them than three bad rows. */
const SIDE_BY_SIDE = 3;

/** Why a row is flagged, or why it could not be judged, as a plain sentence; null for a row with nothing to tell. */
export function rowReason(input: ReasonInput): string | null {
  const { scores, row } = input;
  if (scores.reason !== null) return `Rows were not ranked: ${scores.reason}.`;
  const z = scores.z[row] ?? null;
  if (z === null) return "This row has no readings.";
  const step = describeStep(input);
  if (scores.wheelTrackRows.includes(row + 1)) return wheelTrackReason(input, step);
  if (!input.flagged[row]) return smallStepReason(input, z);
  const neighbours = flaggedRun(input);
  const score = `robust score ${z.toFixed(1)}, limit ${Z_LIMIT}`;
  if (neighbours.length < SIDE_BY_SIDE) return `${step} (${score}).`;
  return (
    `${step} (${score}). Rows ${neighbours[0]} to ${neighbours[neighbours.length - 1]} differ side by side: consistent with ` +
    "a band of residue or a wheel track that always met the same rows. This log cannot tell which; one pass at an angle would."
  );
}

function describeStep({ scores, row, medianOfRows, unit }: ReasonInput): string {
  const deviation = scores.deviation[row]!;
  const direction = deviation < 0 ? "below" : "above";
  const share =
    medianOfRows === 0
      ? ""
      : `, ${((100 * Math.abs(deviation)) / Math.abs(medianOfRows)).toFixed(0)} % of the median row`;
  return `Typically ${formatSi(Math.abs(deviation), unit)} ${direction} the other rows${share}`;
}

function wheelTrackReason({ scores, flagged, row }: ReasonInput, step: string): string {
  const rows = scores.wheelTrackRows.join(", ");
  const group = `rows ${rows} stand out alike on both sides of the machine, consistent with wheel tracks`;
  if (!flagged[row]) return `${step}; ${group}, so they are compared among themselves.`;
  return `${step}; ${group}, yet this one stands out from that group too (robust score ${scores.z[row]!.toFixed(1)}).`;
}

function smallStepReason(input: ReasonInput, z: number): string | null {
  if (Math.abs(z) <= Z_LIMIT) return null;
  return `${describeStep(input)}: it stands out (robust score ${z.toFixed(1)}), but by no more than 5 %, so it is not flagged.`;
}

/** Flagged rows (from 1) side by side with this one, deviating the same way, itself included. */
function flaggedRun({ scores, row, flagged }: ReasonInput): number[] {
  const alike = (other: number) => flagged[other] === true && scores.deviation[other]! * scores.deviation[row]! > 0;
  let first = row;
  let last = row;
  while (alike(first - 1)) first--;
  while (alike(last + 1)) last++;
  return Array.from({ length: last - first + 1 }, (_, k) => first + k + 1);
}

/** A number with its SI unit, three digits: enough for a sentence. */
function formatSi(value: number, unit: string): string {
  const digits = value >= 100 ? 0 : value >= 10 ? 1 : value >= 1 ? 2 : 3;
  return unit === "1" || unit === "boolean" || unit === "fraction"
    ? value.toFixed(digits)
    : `${value.toFixed(digits)} ${unit}`;
}
