"use client";

import { keepPreviousData, useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { useEffect, useState } from "react";
import type { z } from "zod";
import { requestJson } from "@/lib/api/request-json";
import type { CleaningRules } from "@/lib/cleaning/rule-catalogue";
import { Cleaning, CleaningPreview, type CleaningChange, type CleaningUndo } from "@/lib/schemas/cleaning";

const pathOf = (logId: string) => `/api/v1/logs/${logId}/cleaning`;
export const cleaningKey = (logId: string) => ["logs", logId, "cleaning"] as const;

/** The rules in force with what each takes out. The first look at a log counts all of them. */
export function useCleaning(logId: string) {
  return useQuery({
    queryKey: cleaningKey(logId),
    queryFn: () => requestJson(Cleaning, pathOf(logId)),
    staleTime: 30_000,
  });
}

/** Typing is over when nothing was typed for so long. */
const PAUSE_MS = 400;

/** What other rules would do; null: nothing to ask. Asked once the person pauses, and the answer before stays until then. */
export function useCleaningPreview(logId: string, revision: number, rules: CleaningRules | null) {
  const settled = useSettled(rules);
  const query = useQuery({
    queryKey: [...cleaningKey(logId), "preview", revision, settled],
    queryFn: ({ signal }) =>
      requestJson(CleaningPreview, `${pathOf(logId)}/preview`, { method: "POST", body: { rules: settled }, signal }),
    enabled: settled !== null,
    placeholderData: keepPreviousData,
    staleTime: Infinity,
  });
  const isSettled = rules === settled;
  return {
    data: rules === null ? undefined : query.data,
    error: rules === null ? null : query.error,
    isCounting: rules !== null && (!isSettled || query.isFetching),
  };
}

function useSettled<Value>(value: Value): Value {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(value), PAUSE_MS);
    return () => clearTimeout(timer);
  }, [value]);
  return settled;
}

/** After a change of its adjustments everything a screen knows of a log is asked for again; previews are no longer true. */
export function useForgetLog(logId: string) {
  const client = useQueryClient();
  return () => {
    client.removeQueries({ queryKey: [...cleaningKey(logId), "preview"], type: "inactive" });
    return Promise.all([
      client.invalidateQueries({ queryKey: ["logs", logId] }),
      client.invalidateQueries({ queryKey: ["fields"] }),
    ]);
  };
}

/** Puts rules in force, or goes back to an earlier revision. */
export function useReviseCleaning(logId: string) {
  const client = useQueryClient();
  const onSettled = useForgetLog(logId);
  const onSuccess = (cleaning: Cleaning) => client.setQueryData(cleaningKey(logId), cleaning);
  return {
    put: useMutation({
      mutationFn: (body: z.input<typeof CleaningChange>) =>
        requestJson(Cleaning, pathOf(logId), { method: "POST", body, idempotencyKey: crypto.randomUUID() }),
      onSuccess,
      onSettled,
    }),
    undo: useMutation({
      mutationFn: (body: z.input<typeof CleaningUndo>) =>
        requestJson(Cleaning, `${pathOf(logId)}/undo`, { method: "POST", body, idempotencyKey: crypto.randomUUID() }),
      onSuccess,
      onSettled,
    }),
  };
}
