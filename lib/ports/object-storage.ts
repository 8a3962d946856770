export interface ObjectRange {
  /** First byte. */
  start: number;
  /** Last byte, included. */
  end: number;
}

export interface GetOptions {
  /** The reader is done with a chunk when it asks for the next one: its memory may be used again. */
  lends?: boolean;
}

/** Where files are kept, addressed by key. Keys use `/` and never start with it. */
export interface ObjectStorage {
  /**
   * Stores the whole body under the key. When the body fails or `signal` aborts, nothing is kept under the key.
   * @returns how many bytes were stored
   */
  put(
    key: string,
    body: AsyncIterable<Uint8Array> | Uint8Array,
    options?: { signal?: AbortSignal; contentType?: string },
  ): Promise<{ bytes: number }>;
  /** @throws AppError `not_found` on the first read when the key does not exist. */
  get(key: string, range?: ObjectRange, options?: GetOptions): AsyncIterable<Uint8Array>;
  /** Null when the key does not exist. */
  head(key: string): Promise<{ bytes: number } | null>;
  /** Gives an object a second key. */
  copy(from: string, to: string): Promise<void>;
  /** Deleting what is not there is fine. */
  delete(key: string): Promise<void>;
  list(prefix: string): AsyncIterable<{ key: string; bytes: number; modifiedAt: Date | null }>;
  /** @throws when the store does not answer; used by the readiness check. */
  ping(): Promise<void>;
}
