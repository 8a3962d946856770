"use client";

import { keepPreviousData, useQuery } from "@tanstack/react-query";
import type { ReadLog } from "@/components/field-book/field-book-requests";
import { logVersionKey, type LogVersion } from "@/components/field-book/use-log-data";
import { requestJson } from "@/lib/api/request-json";
import { PassStatisticsBody, RampsBody } from "@/lib/schemas/pass-figures";

const FOREVER = { staleTime: Infinity, gcTime: 10 * 60_000 } as const;

function pathOf({ logId, cleaned = true }: ReadLog, answer: string, channel: string): string {
  return `/api/v1/logs/${logId}/${answer}?channel=${encodeURIComponent(channel)}${cleaned ? "" : "&cleaned=false"}`;
}

/** A channel pass by pass; while another channel is fetched the one before stays, so nothing jumps. */
export function usePassStatistics(log: LogVersion, channel: string) {
  return useQuery({
    queryKey: logVersionKey(log, "pass-statistics", channel),
    queryFn: () => requestJson(PassStatisticsBody, pathOf(log, "pass-statistics", channel)),
    placeholderData: keepPreviousData,
    ...FOREVER,
  });
}

/** How a channel starts and ends its passes. */
export function useRamps(log: LogVersion, channel: string) {
  return useQuery({
    queryKey: logVersionKey(log, "ramps", channel),
    queryFn: () => requestJson(RampsBody, pathOf(log, "ramps", channel)),
    placeholderData: keepPreviousData,
    ...FOREVER,
  });
}
