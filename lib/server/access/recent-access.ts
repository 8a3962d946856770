import "server-only";
import { LRUCache } from "lru-cache";

/** What was allowed by another process's leave ends within this time when that process takes it back. */
const KEPT_MS = 2_000;

interface Memory {
  found: LRUCache<string, object>;
  changes: number;
}

// One memory a process, also across Next's separately bundled routes and actions.
const shared = globalThis as typeof globalThis & { coulterbookRecentAccess?: Memory };
const memory = (shared.coulterbookRecentAccess ??= {
  found: new LRUCache<string, object>({ max: 5_000, ttl: KEPT_MS, ttlResolution: 0 }),
  changes: 0,
});

interface RecallOptions<Value> {
  /** False where what is remembered no longer serves. */
  serves?: (value: Value) => boolean;
}

/**
 * What `find` found out about the same key in the last two seconds, for requests that come by the dozen (the tiles of one
 * map). The key must name all that the answer depends on. Refusals are never kept, and everything is forgotten as soon as
 * this process changes anything, so that only a change made by another process takes up to two seconds to be felt.
 */
export async function recallAccess<Value extends object>(
  key: string,
  find: () => Promise<Value>,
  { serves = () => true }: RecallOptions<Value> = {},
): Promise<Value> {
  const known = memory.found.get(key) as Value | undefined;
  if (known && serves(known)) return known;
  const { changes } = memory;
  const value = await find();
  // What was looked up before a change must not outlive it.
  if (changes === memory.changes) memory.found.set(key, value);
  return value;
}

/** Called after every request that may have changed something. */
export function forgetAccess(): void {
  memory.changes++;
  memory.found.clear();
}
