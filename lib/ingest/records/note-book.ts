import { sayNote } from "@/lib/ingest/records/say-note";
import type { LogNote } from "@/lib/logs/machine-log";

/** Gathers notes while a file is read: one entry a code (and column), with a count and the first place. */
export class NoteBook {
  private readonly entries = new Map<string, { code: string; count: number; firstLine?: number; column?: string }>();

  add(code: string, line?: number, column?: string): void {
    const key = column === undefined ? code : `${code} ${column}`;
    const entry = this.entries.get(key);
    if (entry) entry.count++;
    else this.entries.set(key, { code, count: 1, firstLine: line, column });
  }

  /** Sets a note whose count was kept elsewhere; nothing is noted for a count of 0. */
  set(code: string, count: number, firstLine?: number): void {
    if (count > 0) this.entries.set(code, { code, count, firstLine });
  }

  /** Takes back notes that no longer hold. */
  drop(code: string): void {
    this.entries.delete(code);
  }

  /** Takes one back of what was counted: it is told by another note. */
  takeBack(code: string): void {
    const entry = this.entries.get(code);
    if (entry && --entry.count === 0) this.entries.delete(code);
  }

  countOf(code: string): number {
    return this.entries.get(code)?.count ?? 0;
  }

  firstLineOf(code: string): number | undefined {
    return this.entries.get(code)?.firstLine;
  }

  /** The notes, each said by `sayNote`. */
  list(place: string): LogNote[] {
    return [...this.entries.values()].map(({ code, count, firstLine, column }) => ({
      code,
      count,
      ...(firstLine === undefined ? {} : { firstLine }),
      message: sayNote(code, count, { place, firstLine, column }),
    }));
  }
}
