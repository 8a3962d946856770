"use client";

import { extent } from "d3-array";
import { COMPARISON_WORDS, groupWords, shownValue } from "@/components/field-book/passes/group-words";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import type { PassComparison, PassGroup, PassStatisticsBody } from "@/lib/schemas/pass-figures";

/** Direction, headland, speed and turns, one under the other: a dot for each mean, a line for its 95 % interval, the numbers beside it. */
export function GroupCharts({ statistics }: { statistics: PassStatisticsBody }) {
  return (
    // Reached by keyboard so that it can be scrolled.
    <div tabIndex={0} role="group" aria-label="Passes compared" className="h-full space-y-3 overflow-y-auto pr-1">
      {statistics.comparisons.map((comparison) => (
        <Comparison key={comparison.by} comparison={comparison} statistics={statistics} />
      ))}
      <p className="pb-1 text-table text-ink-soft">
        Dot: mean weighted by distance. Line: its 95{"\u202f"}% interval, from passes drawn anew.
      </p>
    </div>
  );
}

interface ComparisonProps {
  comparison: PassComparison;
  statistics: PassStatisticsBody;
}

function Comparison({ comparison, statistics }: ComparisonProps) {
  const { by, groups, reason } = comparison;
  const units = useChannelUnits(statistics.unit, statistics.channel);
  const speed = useChannelUnits("m/s", "speed");
  const distance = useChannelUnits("m", "distance");
  const shown = groups.map((group) => ({ group, ...shownValue(by, group) }));
  const [low, high] = scaleOf(statistics, by);
  return (
    <section aria-label={COMPARISON_WORDS[by]}>
      <h3 className="text-table font-semibold">
        {COMPARISON_WORDS[by]}
        {by === "turn" && groups.length > 0 ? (
          <span className="font-normal text-ink-soft"> · against the same rows going straight</span>
        ) : null}
      </h3>
      <ul>
        {shown.map(({ group, value, interval }) => (
          <li key={group.key} className="grid grid-cols-[9rem_1fr_4.5rem] items-center gap-2 text-table">
            <span>
              {groupWords(group, speed.format)}
              <span className="block text-[11px] leading-3 text-ink-soft">
                {distance.format(group.distanceM)} in {group.passes} {group.passes === 1 ? "pass" : "passes"}
              </span>
            </span>
            <DotAndLine low={low} high={high} value={value} interval={interval} />
            <span className="tabular text-right">{signed(by, units.format(value), value)}</span>
          </li>
        ))}
        {shown.length > 0 ? (
          <li
            aria-hidden
            className="tabular grid grid-cols-[9rem_1fr_4.5rem] gap-2 text-[11px] leading-4 text-ink-soft"
          >
            <span className="text-right">scale</span>
            <span className="flex justify-between whitespace-nowrap border-t border-edge">
              <span>{units.format(low)}</span>
              <span>{units.format(high)}</span>
            </span>
          </li>
        ) : null}
      </ul>
      <p className="text-table text-ink-soft">{differenceWords(comparison, { units, speed }) ?? reason}</p>
    </section>
  );
}

/** One scale for all means, so that lengths can be held against each other; turns, which show differences, have their own. */
function scaleOf({ comparisons }: PassStatisticsBody, by: PassComparison["by"]): [number, number] {
  const alike = comparisons.filter((comparison) => (comparison.by === "turn") === (by === "turn"));
  const values = alike.flatMap((comparison) =>
    comparison.groups.flatMap((group) => {
      const { value, interval } = shownValue(comparison.by, group);
      return [value, ...(interval ?? [])];
    }),
  );
  const [low = 0, high = 1] = extent(values.filter((value) => value !== null));
  return [low, high];
}

function signed(by: PassComparison["by"], text: string, value: number | null): string {
  return by === "turn" && value !== null && value > 0 ? `+${text}` : text;
}

interface Formats {
  units: { format: (value: number) => string };
  speed: { format: (value: number) => string };
}

/** "north, 2° less south, 182°: 12 N (4 N to 20 N)." */
export function differenceWords(
  { by, groups, difference, reason }: PassComparison,
  { units, speed }: Formats,
): string | null {
  if (!difference) return null;
  const wordsOf = (key: string) => {
    const group = groups.find((candidate) => candidate.key === key);
    return group ? groupWords({ ...group, speedBetweenMps: undefined }, speed.format) : key;
  };
  // Means of inner and outer rows differ already where the rows themselves do.
  if (by === "turn") return reason;
  const value = `${wordsOf(difference.first)} less ${wordsOf(difference.second)}: ${units.format(difference.value)}`;
  const sentence = value.charAt(0).toUpperCase() + value.slice(1);
  if (!difference.interval) return `${sentence}. ${reason ?? "Too few passes for an interval."}`;
  const [from, to] = difference.interval;
  const verdict = from <= 0 && to >= 0 ? "; none at all cannot be ruled out" : "";
  return `${sentence} (${units.format(from)} to ${units.format(to)})${verdict}.`;
}

interface DotAndLineProps {
  low: number;
  high: number;
  value: PassGroup["mean"];
  interval: PassGroup["interval"];
}

function DotAndLine({ low, high, value, interval }: DotAndLineProps) {
  const place = (at: number) => `${high > low ? (100 * (at - low)) / (high - low) : 50}%`;
  return (
    <svg className="h-6 w-full overflow-visible" aria-hidden="true">
      <line x1="0" x2="100%" y1="50%" y2="50%" stroke="#E4E0D5" />
      {interval ? (
        <line x1={place(interval[0])} x2={place(interval[1])} y1="50%" y2="50%" stroke="#1E2430" strokeWidth={2} />
      ) : null}
      {value === null ? null : <circle cx={place(value)} cy="50%" r={4} fill="#C29A45" stroke="#1E2430" />}
    </svg>
  );
}
