import { channelWords } from "@/lib/legend/channel-words";
import type { Log } from "@/lib/schemas/logs";

/** What one side of a comparison is called: its reading, and its log where there are two. */
export function saySide(channel: string, log: Log, other: Log): string {
  const { name } = channelWords(channel);
  return log.id === other.id ? name : `${name}, ${log.name}`;
}
