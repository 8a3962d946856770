/** The outcome of reading a file or of an analysis: a value, or an error that is part of normal life. */
export type Result<T, E> = { ok: true; value: T } | { ok: false; error: E };

export function succeed<T>(value: T): { ok: true; value: T } {
  return { ok: true, value };
}

export function fail<E>(error: E): { ok: false; error: E } {
  return { ok: false, error };
}
