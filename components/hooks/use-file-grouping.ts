"use client";

import { useEffect, useState } from "react";
import type { FileEnds, Grouping } from "@/lib/ingest/propose-grouping";

async function readEnds(file: File, bytes: { head: number; tail: number }): Promise<FileEnds> {
  const read = async (part: Blob) => new Uint8Array(await part.arrayBuffer());
  const rest = Math.max(bytes.head, file.size - bytes.tail);
  return { name: file.name, head: await read(file.slice(0, bytes.head)), tail: await read(file.slice(rest)) };
}

/** Whether several files look like parts of one log; null while that is being looked at. The readers load when needed. */
export function useFileGrouping(files: readonly File[]): Grouping | null {
  const [found, setFound] = useState<{ files: readonly File[]; grouping: Grouping } | null>(null);
  useEffect(() => {
    if (files.length < 2) return;
    let isOver = false;
    const look = async () => {
      const { proposeGrouping, END_BYTES } = await import("@/lib/ingest/propose-grouping");
      const ends: FileEnds[] = [];
      for (const file of files) ends.push(await readEnds(file, END_BYTES));
      return proposeGrouping(ends);
    };
    look()
      .catch((): Grouping => ({ together: false, reason: "The files could not be looked into from here." }))
      .then((grouping) => (isOver ? undefined : setFound({ files, grouping })));
    return () => {
      isOver = true;
    };
  }, [files]);
  return found?.files === files ? found.grouping : null;
}
