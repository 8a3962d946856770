"use client";

import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { requestJson } from "@/lib/api/request-json";
import { ComparisonBody } from "@/lib/schemas/comparison";
import type { Log } from "@/lib/schemas/logs";

const stateOf = ({ id, version, revision = 0 }: Log) => `${id} ${version}.${revision}`;

/** Two logs compared in one channel; a version and a revision never change, so nothing is asked for twice. */
export function useComparison(before: Log, after: Log, channel: string) {
  return useQuery({
    queryKey: ["comparison", stateOf(before), stateOf(after), channel],
    queryFn: ({ signal }) => {
      const query = new URLSearchParams({ with: after.id, channel });
      return requestJson(ComparisonBody, `/api/v1/logs/${before.id}/compare?${query}`, { signal });
    },
    placeholderData: keepPreviousData,
    staleTime: Infinity,
  });
}
