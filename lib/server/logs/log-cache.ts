import { LRUCache } from "lru-cache";

const CACHE_BYTES = 512 * 1024 * 1024;

interface Entry {
  value: unknown;
  bytes: number;
}

// One cache a process, also across hot reloads and Next's separately bundled routes.
const shared = globalThis as typeof globalThis & {
  coulterbookLogCache?: LRUCache<string, Entry>;
  coulterbookLogLoads?: Map<string, Promise<Entry>>;
};
const cache = (shared.coulterbookLogCache ??= new LRUCache<string, Entry>({
  maxSize: CACHE_BYTES,
  sizeCalculation: (entry) => Math.max(1, entry.bytes),
}));
const loads = (shared.coulterbookLogLoads ??= new Map<string, Promise<Entry>>());

/**
 * What `load` gives for a key, kept while there is room; two that ask at once share one load. Keys name a log's version,
 * so an entry never goes stale. The caller has checked that the log may be seen.
 */
export async function cachedForLog<Value>(
  key: string,
  load: () => Promise<{ value: Value; bytes: number }>,
): Promise<Value> {
  const kept = cache.get(key);
  if (kept) return kept.value as Value;
  let loading = loads.get(key);
  if (!loading) {
    loading = load();
    loads.set(key, loading);
    void loading
      .then((entry) => cache.set(key, entry))
      .catch(() => undefined)
      .finally(() => loads.delete(key));
  }
  return (await loading).value as Value;
}
