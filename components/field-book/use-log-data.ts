"use client";

import { keepPreviousData, queryOptions, useQuery } from "@tanstack/react-query";
import {
  fetchOverview,
  fetchPasses,
  fetchReadings,
  fetchRowStatistics,
  fetchTileJson,
} from "@/components/field-book/field-book-requests";
import { createPassTrack } from "@/lib/map-state/pass-track";

/** A version of a log never changes, so nothing about it is asked for twice. */
export interface LogVersion {
  logId: string;
  version: number;
}

const FOREVER = { staleTime: Infinity, gcTime: 10 * 60_000 } as const;

function keyOf({ logId, version }: LogVersion, ...rest: (string | number)[]) {
  return ["log-version", logId, version, ...rest] as const;
}

export function trackQuery(log: LogVersion, channel: string, pass: number) {
  return queryOptions({
    queryKey: keyOf(log, "track", channel, pass),
    queryFn: async () => createPassTrack(await fetchReadings(log.logId, channel, pass)),
    ...FOREVER,
  });
}

export function usePasses(log: LogVersion) {
  return useQuery({ queryKey: keyOf(log, "passes"), queryFn: () => fetchPasses(log.logId), ...FOREVER });
}

/** The readings of one pass; while another is fetched the one before stays, so nothing jumps. */
export function useTrack(log: LogVersion, channel: string, pass: number | null) {
  return useQuery({
    ...trackQuery(log, channel, pass ?? 0),
    enabled: pass !== null,
    placeholderData: keepPreviousData,
  });
}

export function useRowStatistics(log: LogVersion, channel: string) {
  return useQuery({
    queryKey: keyOf(log, "rows", channel),
    queryFn: () => fetchRowStatistics(log.logId, channel),
    placeholderData: keepPreviousData,
    ...FOREVER,
  });
}

export function useOverview(log: LogVersion, channel: string) {
  return useQuery({
    queryKey: keyOf(log, "overview", channel),
    queryFn: () => fetchOverview(log.logId, channel),
    placeholderData: keepPreviousData,
    ...FOREVER,
  });
}

export function useTileJson(log: LogVersion, channel: string) {
  return useQuery({
    queryKey: keyOf(log, "tiles", channel),
    queryFn: () => fetchTileJson(log.logId, channel),
    ...FOREVER,
  });
}
