import { UNDECIDED, type Choices, type ColumnChoice } from "@/components/columns/column-choice";
import { isRowable } from "@/lib/ingest/channel-quantities";
import type { LogShape } from "@/lib/ingest/mapping";
import type { ChannelId } from "@/lib/logs/channel";

/** What the columns mean, and how the file lays its rows out. */
export interface Layout {
  shape: LogShape;
  choices: Choices;
}

/** Columns read as one channel, in the order of the file (which is that of the choices). */
function columnsOf(choices: Choices, channel: ChannelId): string[] {
  return Object.keys(choices).filter((name) => {
    const choice = choices[name];
    return choice?.use === "channel" && choice.channel === channel;
  });
}

function rowableChannels(choices: Choices): ChannelId[] {
  const channels = Object.values(choices).flatMap(({ use, channel }) =>
    use === "channel" && channel ? [channel] : [],
  );
  return [...new Set(channels)].filter(isRowable);
}

/**
 * Gives the columns of one channel their rows where several have none: 1, 2, 3 … in the order of the file. Rows that
 * somebody typed stay; a column that comes to them takes the next free number.
 */
function numberRows(choices: Choices, channel: ChannelId): Choices {
  const names = columnsOf(choices, channel);
  const bare = names.filter((name) => choices[name]?.row === null);
  if (names.length < 2 || bare.length === 0) return choices;
  const given = names.flatMap((name) => choices[name]?.row ?? []);
  const isOwnCount = given.every((row, index) => row === index + 1);
  const toNumber = isOwnCount ? names : bare;
  const after = isOwnCount ? 0 : Math.max(0, ...given);
  const numbered = toNumber.map((name, index): [string, ColumnChoice] => [
    name,
    { ...(choices[name] ?? UNDECIDED), row: after + index + 1 },
  ]);
  return { ...choices, ...Object.fromEntries(numbered) };
}

/**
 * Takes a person's change of some columns. One channel for several columns can only mean a column a row, and so can a row
 * number: either makes the file wide, unless it has a column of row numbers.
 */
export function changeColumns(before: Layout, names: readonly string[], patch: Partial<ColumnChoice>): Layout {
  const changed = names.map((name): [string, ColumnChoice] => [
    name,
    { ...(before.choices[name] ?? UNDECIDED), ...patch },
  ]);
  const choices = { ...before.choices, ...Object.fromEntries(changed) };
  if (columnsOf(choices, "row").length > 0) return { ...before, choices };
  const { channel } = patch;
  const isNewMeaning = patch.use === "channel" && channel != null && isRowable(channel);
  const numbered = isNewMeaning ? numberRows(choices, channel) : choices;
  const hasRows = isNewMeaning && names.some((name) => numbered[name]?.row != null);
  const isWide = typeof patch.row === "number" || hasRows || numbered !== choices;
  return { shape: isWide ? "wide" : before.shape, choices: numbered };
}

/** Takes a person's word on how the file is laid out: a column a row needs row numbers, the others have none. */
export function changeShape({ choices }: Layout, shape: LogShape): Layout {
  if (shape === "wide") return { shape, choices: rowableChannels(choices).reduce(numberRows, choices) };
  const bare = Object.entries(choices).map(([name, choice]): [string, ColumnChoice] => [
    name,
    { ...choice, row: null },
  ]);
  return { shape, choices: Object.fromEntries(bare) };
}
