"use client";

import { keepPreviousData, queryOptions, useQuery } from "@tanstack/react-query";
import {
  fetchOverview,
  fetchPasses,
  fetchReadings,
  fetchRowStatistics,
  fetchTileJson,
  fetchVerdict,
} from "@/components/field-book/field-book-requests";
import { createPassTrack } from "@/lib/map-state/pass-track";

/** A version of a log with one revision of its adjustments never changes, so nothing about it is asked for twice. */
export interface LogVersion {
  logId: string;
  version: number;
  /** Number of the adjustments in force; 0 for a log as it was read. */
  revision?: number;
  /** False: the log as it was read, whatever adjustments there are. */
  cleaned?: boolean;
}

const FOREVER = { staleTime: Infinity, gcTime: 10 * 60_000 } as const;

/** Name of an answer about a log in the cache. */
export function logVersionKey(
  { logId, version, revision = 0, cleaned = true }: LogVersion,
  ...rest: (string | number)[]
) {
  return ["log-version", logId, version, cleaned ? revision : "as-logged", ...rest] as const;
}

export function trackQuery(log: LogVersion, channel: string, pass: number) {
  return queryOptions({
    queryKey: logVersionKey(log, "track", channel, pass),
    queryFn: async () => createPassTrack(await fetchReadings(log, channel, pass)),
    ...FOREVER,
  });
}

export function usePasses(log: LogVersion) {
  return useQuery({ queryKey: logVersionKey(log, "passes"), queryFn: () => fetchPasses(log.logId), ...FOREVER });
}

/** The readings of one pass; while another is fetched the one before stays, so nothing jumps. */
export function useTrack(log: LogVersion, channel: string, pass: number | null) {
  return useQuery({
    ...trackQuery(log, channel, pass ?? 0),
    enabled: pass !== null,
    placeholderData: keepPreviousData,
  });
}

export function useRowStatistics(log: LogVersion, channel: string, isWanted = true) {
  return useQuery({
    enabled: isWanted,
    queryKey: logVersionKey(log, "rows", channel),
    queryFn: () => fetchRowStatistics(log, channel),
    placeholderData: keepPreviousData,
    ...FOREVER,
  });
}

export function useOverview(log: LogVersion, channel: string) {
  return useQuery({
    queryKey: logVersionKey(log, "overview", channel),
    queryFn: () => fetchOverview(log, channel),
    placeholderData: keepPreviousData,
    ...FOREVER,
  });
}

export function useTileJson(log: LogVersion, channel: string, isWanted = true) {
  return useQuery({
    enabled: isWanted,
    queryKey: logVersionKey(log, "tiles", channel),
    queryFn: () => fetchTileJson(log, channel),
    ...FOREVER,
  });
}

export function useLogVerdict(log: LogVersion, isWanted: boolean) {
  return useQuery({
    queryKey: logVersionKey(log, "verdict"),
    queryFn: () => fetchVerdict(log),
    enabled: isWanted,
    ...FOREVER,
  });
}
