import type { RampsBody } from "@/lib/schemas/pass-figures";

interface Formats {
  value: (valueSi: number) => string;
  distance: (metres: number) => string;
}

/** What the starts of passes amount to, in one sentence with its numbers. */
export function rampWords({ start, passes, reason }: RampsBody, { value, distance }: Formats): string {
  if (reason !== null) return reason;
  const first = start.metres[0];
  if (!first || first.difference === null || first.interval === null) return "";
  if (start.settledAtM === 0)
    return `Passes start as they go on: nothing in the first metres differs from their middle.`;
  const size = `${value(Math.abs(first.difference))} ${first.difference < 0 ? "below" : "above"} the middle of the pass`;
  const until =
    start.settledAtM === null
      ? `and had not settled by ${distance(start.metres.length)}`
      : `and settle after ${distance(start.settledAtM)}`;
  return `Over ${passes} passes, starts read ${size} ${until}.`;
}
