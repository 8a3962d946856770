import { isChannelId } from "@/lib/logs/channel";

/** What the address of a comparison names. */
export interface CompareAddress {
  before: string | null;
  after: string | null;
  channel: string | null;
}

export function readCompareAddress(search: URLSearchParams): CompareAddress {
  const channel = search.get("channel");
  return {
    before: search.get("a"),
    after: search.get("b"),
    channel: channel !== null && isChannelId(channel) ? channel : null,
  };
}

export function writeCompareAddress({ before, after, channel }: CompareAddress): string {
  const search = new URLSearchParams();
  if (before) search.set("a", before);
  if (after) search.set("b", after);
  if (channel) search.set("channel", channel);
  return search.toString();
}
