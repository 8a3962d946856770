import { requestJson } from "@/lib/api/request-json";
import {
  LogOverview,
  PassList,
  ReadingAt,
  RowStatisticsBody,
  TileJson,
  VerdictBody,
  type PassBody,
} from "@/lib/schemas/logs";
import { PackablePassReadings } from "@/lib/schemas/packed-readings";

const ROOT = "/api/v1/logs";

/** All passes of a log, page by page. */
export async function fetchPasses(logId: string): Promise<PassBody[]> {
  const passes: PassBody[] = [];
  let cursor: string | null = null;
  do {
    const from: string = cursor === null ? "" : `&cursor=${encodeURIComponent(cursor)}`;
    const page: { items: PassBody[]; nextCursor: string | null } = await requestJson(
      PassList,
      `${ROOT}/${logId}/passes?limit=500${from}`,
    );
    passes.push(...page.items);
    cursor = page.nextCursor;
  } while (cursor !== null);
  return passes;
}

/** A log and whether its adjustments apply. */
export interface ReadLog {
  logId: string;
  cleaned?: boolean;
}

/** The address of an answer about a channel. */
function channelPath({ logId, cleaned = true }: ReadLog, answer: string, channel: string): string {
  return `${ROOT}/${logId}/${answer}?channel=${encodeURIComponent(channel)}${cleaned ? "" : "&cleaned=false"}`;
}

export function fetchReadings(log: ReadLog, channel: string, pass: number): Promise<PackablePassReadings> {
  return requestJson(PackablePassReadings, `${channelPath(log, `passes/${pass}/readings`, channel)}&values=packed`);
}

export function fetchRowStatistics(log: ReadLog, channel: string): Promise<RowStatisticsBody> {
  return requestJson(RowStatisticsBody, channelPath(log, "rows", channel));
}

export function fetchOverview(log: ReadLog, channel: string): Promise<LogOverview> {
  return requestJson(LogOverview, channelPath(log, "overview", channel));
}

export function fetchTileJson({ logId, cleaned = true }: ReadLog, channel: string): Promise<TileJson> {
  const query = cleaned ? "" : "?cleaned=false";
  return requestJson(TileJson, `${ROOT}/${logId}/tiles/${encodeURIComponent(channel)}/tiles.json${query}`);
}

export function fetchVerdict({ logId, cleaned = true }: ReadLog): Promise<VerdictBody> {
  return requestJson(VerdictBody, `${ROOT}/${logId}/verdict${cleaned ? "" : "?cleaned=false"}`);
}

export function fetchReadingAt(logId: string, longitude: number, latitude: number): Promise<ReadingAt> {
  return requestJson(ReadingAt, `${ROOT}/${logId}/at?lon=${longitude.toFixed(8)}&lat=${latitude.toFixed(8)}`);
}
