import { createReadStream } from "node:fs";
import { Readable } from "node:stream";
import { ZipFile } from "yazl";

/** A file of a zip: its bytes, its path on disk, or what a generator makes. */
export interface ZipEntry {
  name: string;
  content: Uint8Array | { path: string } | AsyncIterable<Uint8Array>;
  /** Longer than the 4 GB a plain zip entry may have: some old programs cannot open such an entry, so it is not the rule. */
  isHuge?: boolean;
}

/** A zip as it is packed. */
export async function* zipChunks(entries: readonly ZipEntry[], madeOn: Date): AsyncGenerator<Uint8Array> {
  const zip = new ZipFile();
  const output = zip.outputStream as Readable;
  const sources: Readable[] = [];
  const fail = (error: Error) => output.destroy(error);
  zip.on("error", fail);
  for (const { name, content, isHuge } of entries) {
    const options = { mtime: madeOn, compress: true, forceZip64Format: isHuge === true };
    if (content instanceof Uint8Array) zip.addBuffer(Buffer.from(content), name, options);
    else {
      zip.addReadStreamLazy(name, options, (give) => {
        const source = openSource(content).on("error", fail);
        sources.push(source);
        give(null, source);
      });
    }
  }
  zip.end();
  try {
    for await (const chunk of output) yield chunk as Uint8Array;
  } finally {
    for (const source of sources) source.destroy();
  }
}

function openSource(content: { path: string } | AsyncIterable<Uint8Array>): Readable {
  return "path" in content ? createReadStream(content.path) : Readable.from(content, { objectMode: false });
}
