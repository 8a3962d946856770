"use client";

import { useQuery } from "@tanstack/react-query";
import type { LogVersion } from "@/components/field-book/use-log-data";
import { getCoverage } from "@/lib/api/client";
import { requestJson } from "@/lib/api/request-json";
import { CoverageAreas } from "@/lib/schemas/coverage";
import { SwathCollectionBody } from "@/lib/schemas/log-shapes";

/** Where a log went does not change with what is taken out of its readings: the version alone names these. */
const FOREVER = { staleTime: Infinity, gcTime: 10 * 60_000 } as const;

export function useCoverage({ logId, version }: LogVersion) {
  return useQuery({
    queryKey: ["log-version", logId, version, "coverage"],
    queryFn: () => getCoverage(logId),
    ...FOREVER,
  });
}

/** The outline of every pass; asked for once somebody wants to see it. */
export function useSwaths({ logId, version }: LogVersion, isWanted: boolean) {
  return useQuery({
    queryKey: ["log-version", logId, version, "swaths"],
    queryFn: () => requestJson(SwathCollectionBody, `/api/v1/logs/${logId}/swaths`),
    enabled: isWanted,
    ...FOREVER,
  });
}

/** Where ground was gone over twice or left out; worked out on the first asking, which is when the panel is opened. */
export function useCoverageAreas({ logId, version }: LogVersion, isWanted: boolean) {
  return useQuery({
    queryKey: ["log-version", logId, version, "coverage-areas"],
    queryFn: () => requestJson(CoverageAreas, `/api/v1/logs/${logId}/coverage/areas`),
    enabled: isWanted,
    ...FOREVER,
  });
}
