"use client";

import { useQuery } from "@tanstack/react-query";
import { logVersionKey, type LogVersion } from "@/components/field-book/use-log-data";
import { requestJson } from "@/lib/api/request-json";
import { LimitZonesBody, type LimitZoneKind } from "@/lib/schemas/limit-zones";

/** Address of zones past a limit, as GeoJSON. */
export function limitZonesPath({ logId, cleaned = true }: LogVersion, kind: LimitZoneKind): string {
  return `/api/v1/logs/${logId}/zones?kind=${kind}${cleaned ? "" : "&cleaned=false"}`;
}

/** Zones past a limit with their patches; asked for once somebody wants to see them. */
export function useLimitZones(log: LogVersion, kind: LimitZoneKind, isWanted: boolean) {
  return useQuery({
    queryKey: logVersionKey(log, "limit-zones", kind),
    queryFn: ({ signal }) => requestJson(LimitZonesBody, limitZonesPath(log, kind), { signal }),
    enabled: isWanted,
    retry: false,
    staleTime: Infinity,
    gcTime: 10 * 60_000,
  });
}
