"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import { useForgetLog } from "@/components/cleaning/use-cleaning";
import { requestJson, requestNothing } from "@/lib/api/request-json";
import { DelaysBody, type DelaysChange } from "@/lib/schemas/alignment";

const pathOf = (logId: string) => `/api/v1/logs/${logId}/delays`;
const keyOf = (logId: string) => ["logs", logId, "delays"] as const;
const ASK_AGAIN_MS = 1_000;

/** What is known about the delays of a log's channels; asked again while they are being looked for. */
export function useDelays(logId: string) {
  return useQuery({
    queryKey: keyOf(logId),
    queryFn: () => requestJson(DelaysBody, pathOf(logId)),
    refetchInterval: (query) => (query.state.data?.state === "working" ? ASK_AGAIN_MS : false),
  });
}

export function useDelayActions(logId: string) {
  const client = useQueryClient();
  const forget = useForgetLog(logId);
  return {
    /** Starts looking. */
    ask: useMutation({
      mutationFn: () => requestNothing(pathOf(logId), { method: "POST", body: {} }),
      onSettled: () => client.invalidateQueries({ queryKey: keyOf(logId) }),
    }),
    /** Takes delays out of channels from here on, or with 0 leaves them in again. */
    put: useMutation({
      mutationFn: (body: z.input<typeof DelaysChange>) => requestNothing(pathOf(logId), { method: "PUT", body }),
      onSettled: forget,
    }),
  };
}

export type DelayActions = ReturnType<typeof useDelayActions>;
