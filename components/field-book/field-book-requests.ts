import { requestJson } from "@/lib/api/request-json";
import {
  LogOverview,
  PassList,
  PassReadings,
  ReadingAt,
  RowStatisticsBody,
  TileJson,
  type PassBody,
} from "@/lib/schemas/logs";

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

export function fetchReadings(logId: string, channel: string, pass: number): Promise<PassReadings> {
  return requestJson(PassReadings, `${ROOT}/${logId}/passes/${pass}/readings?channel=${encodeURIComponent(channel)}`);
}

export function fetchRowStatistics(logId: string, channel: string): Promise<RowStatisticsBody> {
  return requestJson(RowStatisticsBody, `${ROOT}/${logId}/rows?channel=${encodeURIComponent(channel)}`);
}

export function fetchOverview(logId: string, channel: string): Promise<LogOverview> {
  return requestJson(LogOverview, `${ROOT}/${logId}/overview?channel=${encodeURIComponent(channel)}`);
}

export function fetchTileJson(logId: string, channel: string): Promise<TileJson> {
  return requestJson(TileJson, `${ROOT}/${logId}/tiles/${encodeURIComponent(channel)}/tiles.json`);
}

export function fetchReadingAt(logId: string, longitude: number, latitude: number): Promise<ReadingAt> {
  return requestJson(ReadingAt, `${ROOT}/${logId}/at?lon=${longitude.toFixed(8)}&lat=${latitude.toFixed(8)}`);
}
