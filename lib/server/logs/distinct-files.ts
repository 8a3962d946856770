import { createHash } from "node:crypto";
import type { NewLogFile } from "@/db/queries/log-files";

/** A file of an upload with the names of others that hold the same bytes. */
export type DistinctFile<T> = T & Pick<NewLogFile, "copies">;

interface NamedFile {
  fileName: string;
  sha256: string;
}

/** Each file once, in the order sent; two of one name and other bytes get names that can be told apart. */
export function distinctFiles<T extends NamedFile>(files: readonly T[]): DistinctFile<T>[] {
  const distinct = new Map<string, DistinctFile<T>>();
  const names = new Set<string>();
  for (const file of files) {
    const same = distinct.get(file.sha256);
    if (same) {
      same.copies.push(file.fileName);
      continue;
    }
    const fileName = freeName(file.fileName, names);
    names.add(fileName.toLowerCase());
    distinct.set(file.sha256, { ...file, fileName, copies: [] });
  }
  return [...distinct.values()];
}

function freeName(name: string, taken: ReadonlySet<string>): string {
  const [, stem = name, ending = ""] = /^(.*?)((?:\.[a-z]{1,8}){0,2})$/is.exec(name) ?? [];
  let free = name;
  for (let count = 2; taken.has(free.toLowerCase()); count++) free = `${stem} (${count})${ending}`;
  return free;
}

/** What names a set of files whatever their order: the file's own hash for one, else a hash over all hashes. */
export function hashOfSet(hashes: readonly string[]): string {
  const [only, ...others] = hashes;
  if (only !== undefined && others.length === 0) return only;
  return createHash("sha256")
    .update([...hashes].sort().join("\n"))
    .digest("hex");
}
