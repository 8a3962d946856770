import type { FieldBookState, FieldBookStore } from "@/lib/map-state/field-book-store";

/** What two sides of a comparison always share. */
const SHARED = ["row", "place", "cleaned", "ground", "edges"] as const satisfies (keyof FieldBookState)[];

/** What they share too where both show the same log: its passes and records have the same numbers. */
const SHARED_IN_ONE_LOG = ["pass", "cursor", "stretch", "timeS"] as const satisfies (keyof FieldBookState)[];

type Key = (typeof SHARED)[number] | (typeof SHARED_IN_ONE_LOG)[number];

/** The parts of a state under some keys. */
function partsOf(state: FieldBookState, keys: readonly Key[]): Partial<FieldBookState> {
  return Object.fromEntries(keys.map((key) => [key, state[key]]));
}

function copyChanges(from: FieldBookStore, to: FieldBookStore, keys: readonly Key[]): () => void {
  return from.subscribe((now, before) => {
    const other = to.getState();
    const changed = keys.filter((key) => now[key] !== before[key] && now[key] !== other[key]);
    if (changed.length > 0) to.setState(partsOf(now, changed));
  });
}

/** Has the first say what the second shows. */
function nameChannel(first: FieldBookStore, second: FieldBookStore): void {
  const { comparison, compareWith } = first.getState();
  const { channel } = second.getState();
  if (comparison && comparison.channel !== channel) compareWith({ ...comparison, channel });
}

/**
 * Keeps what two sides of a comparison share the same in both, whoever changes it, and the channel of the second side the
 * one that the first compares with. The second takes over from the first at once. Answers how to part them.
 */
export function linkBooks(first: FieldBookStore, second: FieldBookStore, isOneLog: boolean): () => void {
  const keys: readonly Key[] = isOneLog ? [...SHARED, ...SHARED_IN_ONE_LOG] : SHARED;
  second.setState(partsOf(first.getState(), keys));
  nameChannel(first, second);
  const stops = [
    copyChanges(first, second, keys),
    copyChanges(second, first, keys),
    first.subscribe(({ comparison }, before) => {
      if (comparison && comparison !== before.comparison) second.setState({ channel: comparison.channel });
    }),
    second.subscribe(() => nameChannel(first, second)),
  ];
  return () => stops.forEach((stop) => stop());
}
