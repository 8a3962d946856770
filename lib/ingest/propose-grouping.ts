import { inspectLog, readLog } from "@/lib/ingest";
import { bytesSource, joinChunks } from "@/lib/ingest/byte-source";
import { headerSignature, type LogMapping } from "@/lib/ingest/mapping";
import { isGzip } from "@/lib/ingest/open-text";
import { proposeMapping } from "@/lib/ingest/propose-mapping";

/** First and last bytes of a file; `tail` is empty where `head` is all of it. */
export interface FileEnds {
  name: string;
  head: Uint8Array;
  tail: Uint8Array;
}

export interface Grouping {
  /** Parts of one log, or logs of their own. */
  together: boolean;
  /** Why, in one plain sentence. */
  reason: string;
  /** Places of the files in the order they were logged; absent where that cannot be seen. */
  order?: number[];
}

/** Bytes of a head and of a tail that `proposeGrouping` wants. */
export const END_BYTES = { head: 131_072, tail: 65_536 } as const;

/** A longer break between two files is another job. Common practice (a meal, a refill), no source. */
const LONGEST_BREAK_S = 2 * 3600;
const LINE_FEED = 10;

interface Peek {
  signature: string;
  firstMs: number;
  lastMs: number;
}

const apart = (reason: string, order?: number[]): Grouping => ({ together: false, reason, ...(order && { order }) });

/**
 * Whether files chosen at once look like parts of one log: the same columns, and each begins soon after another ends.
 * Reads whole lines of the ends only. Never throws for bad input: what cannot be looked into is no part.
 */
export async function proposeGrouping(files: readonly FileEnds[]): Promise<Grouping> {
  const peeks: Peek[] = [];
  for (const file of files) {
    const peek = await peekInto(file);
    if (typeof peek === "string") return apart(peek);
    peeks.push(peek);
  }
  if (new Set(peeks.map(({ signature }) => signature)).size > 1) return apart("They have different columns.");
  if (peeks.some(({ firstMs }) => Number.isNaN(firstMs))) {
    return apart("They have the same columns, but not when each was logged.");
  }
  const order = peeks.map((_, index) => index).sort((a, b) => peeks[a]!.firstMs - peeks[b]!.firstMs);
  const ordered = order.map((index) => peeks[index]!);
  let longestS = 0;
  for (let i = 1; i < ordered.length; i++) {
    const breakS = ((ordered[i]?.firstMs ?? NaN) - (ordered[i - 1]?.lastMs ?? NaN)) / 1000;
    if (breakS < 0) {
      return apart("They have the same columns, but were logged at the same time, as by two machines.", order);
    }
    longestS = Math.max(longestS, breakS);
  }
  if (longestS > LONGEST_BREAK_S) {
    return apart(`They have the same columns, but lie up to ${sayTime(longestS)} apart.`, order);
  }
  return {
    together: true,
    reason: `They have the same columns and follow each other, ${sayTime(longestS)} apart at most.`,
    order,
  };
}

function sayTime(seconds: number): string {
  if (seconds < 90) return `${Math.round(seconds)} s`;
  if (seconds < 90 * 60) return `${Math.round(seconds / 60)} min`;
  return `${Math.round(seconds / 3600)} h`;
}

/** What the ends of a file say, or why they say nothing. */
async function peekInto({ name, head, tail }: FileEnds): Promise<Peek | string> {
  if (head[0] === 0x50 && head[1] === 0x4b) return `"${name}" is a zip, which is a log of its own.`;
  if (isGzip(head)) return `"${name}" is packed, so its times cannot be seen from here.`;
  const source = bytesSource(name, joinEnds(head, tail));
  const inspected = await inspectLog(source);
  if (!inspected.ok) return `"${name}" cannot be looked into from here.`;
  const { mapping } = proposeMapping(inspected.value);
  const read = await readLog(source, inAnyZone(mapping));
  if (!read.ok || read.value.log.timeIsRelative) return `When "${name}" was logged cannot be seen from here.`;
  const times = read.value.log.timeMs.filter((ms) => !Number.isNaN(ms));
  return { signature: headerSignature(inspected.value), firstMs: times[0] ?? NaN, lastMs: times.at(-1) ?? NaN };
}

/** Local times are only compared with each other, so that one zone does as well as another. */
function inAnyZone(mapping: LogMapping): LogMapping {
  return { ...mapping, timeZone: mapping.timeZone ?? "UTC" };
}

/** Whole lines from both ends, so that no line is made of two halves. */
function joinEnds(head: Uint8Array, tail: Uint8Array): Uint8Array {
  if (tail.length === 0) return head;
  const first = head.subarray(0, head.lastIndexOf(LINE_FEED) + 1);
  const last = tail.subarray(tail.indexOf(LINE_FEED) + 1);
  return joinChunks([first, last], first.length + last.length);
}
