import { channelWords } from "@/lib/legend/channel-words";
import type { ComparedMeasure, ComparedRow, ComparisonBody } from "@/lib/schemas/comparison";
import type { UnitSystem } from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

export const MEASURE_WORDS: Record<ComparedMeasure["measure"], string> = {
  mean: "Mean",
  spread: "Spread (standard deviation)",
  "share-under-target": "Distance under target",
  "share-at-limit": "Distance at the limit",
  "share-contact-lost": "Distance without contact",
};

export const TOLD_WORDS: Record<ComparedRow["told"], string> = {
  more: "more",
  less: "less",
  "too-small": "too small to matter",
  "cannot-tell": "cannot tell",
};

/** A difference with its sign. */
export function saySigned(value: number | null, format: (value: number | null) => string): string {
  return value !== null && value > 0 ? `+${format(value)}` : format(value);
}

/** "−8 to +4 N". */
export function sayInterval(
  interval: readonly [number, number] | null,
  format: (value: number | null) => string,
): string {
  return interval === null ? "none" : `${saySigned(interval[0], format)} to ${saySigned(interval[1], format)}`;
}

export interface Sentence {
  state: "look" | "none";
  text: string;
}

/** What a comparison comes to, in the person's units: all rows together, then the rows that changed beyond the others. */
export function sayComparison(body: ComparisonBody, system: UnitSystem): Sentence[] {
  const { channel, unit } = body;
  const name = channelWords(channel).name;
  const format = (value: number | null, own = unit) => formatQuantity(value, own, system, { channel }).text;
  const mean = body.overall.find(({ measure }) => measure === "mean");
  const shares = body.overall.filter(({ measure, told }) => measure.startsWith("share") && told !== "cannot-tell");
  return [
    ...(mean ? [sayMean(name, mean, (value) => format(value))] : []),
    ...shares.map((share) => sayShare(share, (value) => format(value, "fraction"))),
    ...(body.rows.length > 0 ? [sayRows(body, (value) => format(value))] : []),
  ];
}

type Format = (value: number | null) => string;

function sayMean(name: string, mean: ComparedMeasure, format: Format): Sentence {
  const { before, after, difference, interval, told } = mean;
  const values = `${name} of all rows together: ${format(before)} before, ${format(after)} after`;
  if (interval === null)
    return { state: "none", text: `${values}. Whether that is a difference, these passes cannot tell.` };
  const within = `${saySigned(difference, format)}, 95${"\u202f"}% interval ${sayInterval(interval, format)}`;
  if (told === "cannot-tell")
    return { state: "none", text: `${values}; ${within}: no difference that these passes can tell.` };
  return { state: "look", text: `${values}; ${within}.` };
}

function sayShare({ measure, before, after, interval }: ComparedMeasure, format: Format): Sentence {
  const words = MEASURE_WORDS[measure];
  return {
    state: "look",
    text: `${words}: ${format(before)} before, ${format(after)} after, 95${"\u202f"}% interval of the difference ${sayInterval(interval, format)}.`,
  };
}

function sayRows({ rows }: ComparisonBody, format: Format): Sentence {
  const told = rows
    .filter((row) => row.told === "more" || row.told === "less")
    .toSorted((a, b) => Math.abs(b.beyondOthers ?? 0) - Math.abs(a.beyondOthers ?? 0));
  if (told.length > 0) {
    const named = told.slice(0, 3).map(({ row, beyondOthers }) => `row ${row} by ${saySigned(beyondOthers, format)}`);
    const rest = told.length > 3 ? ` and ${told.length - 3} more` : "";
    return { state: "look", text: `Beyond the other rows changed ${named.join(", ")}${rest}.` };
  }
  if (rows.every((row) => row.beyondInterval === null)) {
    return { state: "none", text: "Whether a row changed beyond the others, these passes cannot tell." };
  }
  // Where intervals leave 0 out and still nothing is told, the ground stands in the way.
  const isHidden = rows.some((row) => row.told === "cannot-tell" && !holdsZero(row.beyondInterval));
  return {
    state: "none",
    text: isHidden
      ? "Rows changed beyond the others, but cannot be told from the ground they ran on."
      : "No row changed beyond the others by more than passes differ among themselves, or by enough to matter.",
  };
}

function holdsZero(interval: readonly [number, number] | null): boolean {
  return interval === null || (interval[0] <= 0 && interval[1] >= 0);
}
