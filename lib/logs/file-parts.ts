/** A stretch of a log's records that came from one of its files. */
export interface FilePart {
  /** Place of the file in the order sent, from 0. */
  file: number;
  records: number;
  /** What to take from a record's `sourceLine`, which counts on from file to file, to have the line of its own file. */
  linesBefore: number;
}

/** Where the records of a log in several files came from. */
export interface LogFileParts {
  /** Number of files, at least two. */
  files: number;
  /** In the order of the records; null where the log was read before this was kept. */
  parts: FilePart[] | null;
}

/** Finds the part of a record by its number in the log; null beyond the last. Quick for records asked for in order. */
export function partFinder(parts: readonly FilePart[]): (record: number) => FilePart | null {
  let [index, first] = [0, 0];
  return (record) => {
    if (record < first) [index, first] = [0, 0];
    for (;;) {
      const part = parts[index];
      if (!part) return null;
      if (record < first + part.records) return part;
      first += part.records;
      index++;
    }
  };
}
