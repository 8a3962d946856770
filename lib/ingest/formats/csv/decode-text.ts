export type TextEncoding = "utf-8" | "utf-16le" | "utf-16be" | "windows-1252";

export interface FoundEncoding {
  encoding: TextEncoding;
  /** Bytes of byte-order mark to pass over. */
  markBytes: number;
}

/** Encoding of a text from its first bytes: byte-order mark, then the zero bytes of UTF-16, then valid UTF-8. Null for binary. */
export function detectEncoding(head: Uint8Array): FoundEncoding | null {
  if (head[0] === 0xef && head[1] === 0xbb && head[2] === 0xbf) return { encoding: "utf-8", markBytes: 3 };
  if (head[0] === 0xff && head[1] === 0xfe) return { encoding: "utf-16le", markBytes: 2 };
  if (head[0] === 0xfe && head[1] === 0xff) return { encoding: "utf-16be", markBytes: 2 };
  const sample = head.subarray(0, 65_536);
  const zeros = [0, 0];
  for (let i = 0; i < sample.length; i++) if (sample[i] === 0) zeros[i % 2]!++;
  const [even = 0, odd = 0] = zeros;
  const half = sample.length / 2;
  if (odd > half * 0.8 && even === 0) return { encoding: "utf-16le", markBytes: 0 };
  if (even > half * 0.8 && odd === 0) return { encoding: "utf-16be", markBytes: 0 };
  if (even + odd > 0 || controlShare(sample) > 0.02) return null;
  return { encoding: isUtf8(head) ? "utf-8" : "windows-1252", markBytes: 0 };
}

/** Share of bytes that no text has: control characters but tab, line feed, form feed, carriage return. */
function controlShare(sample: Uint8Array): number {
  let count = 0;
  for (const byte of sample) if (byte < 32 && byte !== 9 && byte !== 10 && byte !== 12 && byte !== 13) count++;
  return sample.length === 0 ? 0 : count / sample.length;
}

function isUtf8(head: Uint8Array): boolean {
  try {
    // `stream` lets the head end in the middle of a character.
    new TextDecoder("utf-8", { fatal: true }).decode(head, { stream: true });
    return true;
  } catch {
    return false;
  }
}

export function decodeHead(head: Uint8Array, found: FoundEncoding): string {
  return new TextDecoder(found.encoding).decode(head.subarray(found.markBytes), { stream: true });
}
