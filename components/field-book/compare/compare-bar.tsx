"use client";

import { X } from "lucide-react";
import { ToggleGroup } from "radix-ui";
import { channelsOf } from "@/components/field-book/channel-switch";
import { channelOrFirst, useComparableLogs } from "@/components/field-book/compare/second-book";
import { useBook } from "@/components/field-book/field-book-context";
import { buttonClass } from "@/components/ui/button";
import { formatDay } from "@/components/ui/format-date";
import { channelWords } from "@/lib/legend/channel-words";
import type { Comparison, CompareMode } from "@/lib/map-state/comparison";
import type { Log } from "@/lib/schemas/logs";

const SELECT = "min-h-11 min-w-0 max-w-full rounded border border-edge bg-sheet px-2 text-ink md:min-h-8 md:max-w-44";
const ITEM =
  "min-h-11 px-3 text-table text-ink-soft -outline-offset-2 hover:text-ink data-[state=on]:bg-ink data-[state=on]:text-paper md:min-h-8";

/** With what the open log's reading is compared, and how: one quiet line. */
export function CompareBar({ comparison }: { comparison: Comparison }) {
  const { store, log } = useBook();
  const logs = useComparableLogs();
  const other = logs.find(({ id }) => id === comparison.logId) ?? log;
  const change = (part: Partial<Comparison>) => store.getState().compareWith({ ...comparison, ...part });
  const chooseLog = (found: Log | undefined) =>
    found &&
    change({ logId: found.id === log.id ? null : found.id, channel: channelOrFirst(found, comparison.channel) });
  return (
    <div
      role="group"
      aria-label="Comparison"
      className="flex min-w-0 flex-wrap items-center gap-2 pt-2 text-table text-ink-soft"
    >
      <label className="flex min-w-0 items-center gap-2">
        Compared with
        <select
          className={SELECT}
          value={channelOrFirst(other, comparison.channel)}
          onChange={(event) => change({ channel: event.target.value })}
        >
          {channelsOf(other).map((id) => (
            <option key={id} value={id}>
              {channelWords(id).name}
            </option>
          ))}
        </select>
      </label>
      {logs.length > 1 ? (
        <label className="flex min-w-0 items-center gap-2">
          of
          <select
            aria-label="Log compared with"
            className={SELECT}
            value={other.id}
            onChange={(event) => chooseLog(logs.find(({ id }) => id === event.target.value))}
          >
            {logs.map((each) => (
              <option key={each.id} value={each.id}>
                {each.id === log.id
                  ? "the same log"
                  : [each.name, formatDay(each.startedAt)].filter(Boolean).join(" · ")}
              </option>
            ))}
          </select>
        </label>
      ) : null}
      <ToggleGroup.Root
        type="single"
        aria-label="How the two maps stand"
        value={comparison.mode}
        onValueChange={(mode) => mode && change({ mode: mode as CompareMode })}
        className="inline-flex divide-x divide-rule rounded border border-edge bg-sheet"
      >
        <ToggleGroup.Item value="swipe" className={ITEM}>
          Divider
        </ToggleGroup.Item>
        <ToggleGroup.Item value="side" className={ITEM}>
          Side by side
        </ToggleGroup.Item>
      </ToggleGroup.Root>
      <button
        type="button"
        aria-label="Stop comparing"
        title="Stop comparing"
        className={buttonClass("quiet", "px-2 md:min-h-8 md:px-2")}
        onClick={() => store.getState().compareWith(null)}
      >
        <X size={18} strokeWidth={1.5} aria-hidden />
      </button>
    </div>
  );
}
