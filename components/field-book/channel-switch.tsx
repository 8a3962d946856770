"use client";

import { ToggleGroup } from "radix-ui";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { Menu, MenuItem } from "@/components/ui/menu";
import { channelWords, deviationOf } from "@/lib/legend/channel-words";
import { PLACING_CHANNELS } from "@/lib/logs/channel";
import type { Log } from "@/lib/schemas/logs";

/** Shown first, in this order, where the log has them. */
const FIRST = [
  "margin",
  "resistance",
  "downforce",
  "depth",
  "contact",
  "yieldMass",
  "yieldFlow",
  "moisture",
  "population",
];
/** Shown last: they say how the log was made, not what it measured. */
const LAST = ["rowSpeed", "swathWidth", "distance", "interval"];
/** Buttons before the rest goes into a menu. */
const BUTTONS = 4;

/** Channels of a log that can be drawn: what was measured, what follows from it, and each against the other rows. */
export function channelsOf(log: Log): string[] {
  const placing: readonly string[] = PLACING_CHANNELS;
  const measured = log.channels.map(({ id }) => id).filter((id) => !placing.includes(id));
  const perRow = log.channels.filter((channel) => channel.perRow && channel.id !== "rowSpeed").map(({ id }) => id);
  const plain = [...new Set([...measured, "rowSpeed"])];
  const ranked = [...FIRST, ...LAST];
  const ordered = [
    ...FIRST.filter((id) => plain.includes(id)),
    ...plain.filter((id) => !ranked.includes(id)),
    ...LAST.filter((id) => plain.includes(id)),
  ];
  return [...ordered, ...ordered.filter((id) => perRow.includes(id)).map(deviationOf)];
}

/** Which reading is shown on the map, the pass and the line-up at once. */
export function ChannelSwitch() {
  const { store, log } = useBook();
  const channel = useBookState((state) => state.channel);
  const channels = channelsOf(log);
  const buttons = channels.slice(0, BUTTONS);
  const rest = channels.slice(BUTTONS);
  return (
    <div className="flex min-w-0 flex-wrap items-center gap-2">
      <ToggleGroup.Root
        type="single"
        aria-label="Reading shown"
        value={channel}
        onValueChange={(value) => value && store.getState().chooseChannel(value)}
        className="inline-flex flex-wrap divide-x divide-rule rounded border border-edge bg-sheet"
      >
        {buttons.map((id) => (
          <ToggleGroup.Item key={id} value={id} className={ITEM} title={channelWords(id).meaning}>
            {channelWords(id).name}
          </ToggleGroup.Item>
        ))}
      </ToggleGroup.Root>
      {rest.length > 0 ? (
        <Menu
          trigger={
            <button type="button" className={rest.includes(channel) ? `${MORE} bg-ink text-paper` : `${MORE} bg-sheet`}>
              {rest.includes(channel) ? channelWords(channel).name : "More"}
            </button>
          }
        >
          {rest.map((id) => (
            <MenuItem key={id} onSelect={() => store.getState().chooseChannel(id)}>
              {channelWords(id).name}
            </MenuItem>
          ))}
        </Menu>
      ) : null}
    </div>
  );
}

const ITEM =
  "min-h-11 px-3 text-table text-ink-soft -outline-offset-2 hover:text-ink data-[state=on]:bg-ink data-[state=on]:text-paper md:min-h-8";
const MORE = "min-h-11 rounded border border-edge px-3 text-table hover:border-ink md:min-h-8";
