"use client";

import { ToggleGroup } from "radix-ui";
import { useBook, useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { useOverview } from "@/components/field-book/use-log-data";
import { Menu, MenuGroup, MenuItem } from "@/components/ui/menu";
import { givenClasses } from "@/lib/channels/given-classes";
import { categoriesOf } from "@/lib/legend/categories";
import { channelWords, deviationOf } from "@/lib/legend/channel-words";
import { isDerivedChannel, PLACING_CHANNELS } from "@/lib/logs/channel";
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
  const classes = log.machineId === null ? [] : givenClasses(log.channels, ANY_SETTINGS);
  return [...ordered, ...classes, ...ordered.filter((id) => perRow.includes(id)).map(deviationOf)];
}

/** Masks and cross classes that a log may give: whether its machine's settings are known is told with its readings. */
const ANY_SETTINGS = { targetMarginN: 0, marginDeadbandN: 0, maxDownforceN: 0 };

/** The channels to choose from: without those that the machine of this log has no settings for. */
function useChannels(): string[] {
  const { log } = useBook();
  const channel = useBookState((state) => state.channel);
  const { data: settings } = useOverview(useLogVersion(), channel);
  const given: readonly string[] = settings ? givenClasses(log.channels, settings) : [];
  return channelsOf(log).filter((id) => !isClassChannel(id) || id === channel || given.includes(id));
}

function isClassChannel(id: string): boolean {
  return categoriesOf(id) !== null;
}

interface ChannelGroup {
  title: string;
  ids: string[];
}

function groupsOf(ids: readonly string[]): ChannelGroup[] {
  const compared = ids.filter((id) => id.startsWith("deviation:"));
  const workedOut = ids.filter((id) => isDerivedChannel(id) && !compared.includes(id));
  const logged = ids.filter((id) => !isDerivedChannel(id));
  return [
    { title: "Logged", ids: logged },
    { title: "Worked out", ids: workedOut },
    { title: "Against the other rows", ids: compared },
  ].filter((group) => group.ids.length > 0);
}

/** Which reading is shown on the map, the pass and the line-up at once. */
export function ChannelSwitch() {
  const { store } = useBook();
  const channel = useBookState((state) => state.channel);
  const channels = useChannels();
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
          {groupsOf(rest).map(({ title, ids }) => (
            <MenuGroup key={title} title={title}>
              {ids.map((id) => (
                <MenuItem key={id} onSelect={() => store.getState().chooseChannel(id)}>
                  {channelWords(id).name}
                </MenuItem>
              ))}
            </MenuGroup>
          ))}
        </Menu>
      ) : null}
    </div>
  );
}

const ITEM =
  "min-h-11 px-3 text-table text-ink-soft -outline-offset-2 hover:text-ink data-[state=on]:bg-ink data-[state=on]:text-paper md:min-h-8";
const MORE = "min-h-11 rounded border border-edge px-3 text-table hover:border-ink md:min-h-8";
