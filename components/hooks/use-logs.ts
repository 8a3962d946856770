"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { queryKeys } from "@/components/hooks/query-keys";
import { usePages } from "@/components/hooks/use-pages";
import { useRemove } from "@/components/removals/use-removals";
import {
  cancelLog,
  changeLog,
  deleteLog,
  getColumns,
  getLog,
  getVerdict,
  putMapping,
  retryLog,
} from "@/lib/api/client";
import { listAll, logPage } from "@/lib/api/list-pages";
import type { Log } from "@/lib/schemas/logs";
import type { LogMapping } from "@/lib/ingest/mapping";
import { isWorking } from "@/components/upload/log-state";

/** While a log is being worked on, its list is asked for again every two seconds. */
function askAgain(logs: readonly Log[]): number | false {
  return logs.some((log) => isWorking(log.status)) ? 2_000 : false;
}

/** All logs of one field, for choosing one. */
export function useLogs(fieldId: string) {
  return useQuery({
    queryKey: queryKeys.logs(fieldId),
    queryFn: () => listAll(logPage(fieldId)),
    refetchInterval: (query) => askAgain(query.state.data?.items ?? []),
  });
}

/** The same a page at a time, for looking at them. */
export function useLogPages(fieldId: string) {
  return usePages({ queryKey: queryKeys.logs(fieldId), load: logPage(fieldId), askAgain });
}

export function useLog(logId: string) {
  return useQuery({ queryKey: queryKeys.log(logId), queryFn: () => getLog(logId) });
}

export function useColumns(logId: string) {
  return useQuery({ queryKey: queryKeys.columns(logId), queryFn: () => getColumns(logId), staleTime: Infinity });
}

export function useVerdict(logId: string | undefined, version: number, enabled = true) {
  return useQuery({
    queryKey: queryKeys.verdict(logId ?? "", version),
    queryFn: () => getVerdict(logId ?? ""),
    enabled: enabled && logId !== undefined,
    staleTime: Infinity,
  });
}

/** What can be done to a log of a field; each asks for the list again. */
export function useLogActions(fieldId: string) {
  const client = useQueryClient();
  const remove = useRemove();
  const onSettled = () => client.invalidateQueries({ queryKey: queryKeys.logs(fieldId) });
  return {
    cancel: useMutation({ mutationFn: cancelLog, onSettled }),
    retry: useMutation({ mutationFn: retryLog, onSettled }),
    /** After a time for calling it off. */
    remove: ({ id, name }: Pick<Log, "id" | "name">) =>
      remove({ id, name, remove: () => deleteLog(id), lists: [{ queryKey: queryKeys.logs(fieldId) }] }),
  };
}

/** Puts a log into another field; both fields' lists are asked for again. */
export function useMoveLog(logId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (fieldId: string) => changeLog(logId, { fieldId }),
    onSuccess: (log) => {
      client.setQueryData(queryKeys.log(logId), log);
      void client.invalidateQueries({ queryKey: queryKeys.fields });
    },
  });
}

export interface ConfirmedMapping {
  mapping: LogMapping;
  machineId: string | null;
}

/** Meaning and machine in one step, so that the reading this starts knows both. */
export function usePutMapping(logId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ mapping, machineId }: ConfirmedMapping) => putMapping(logId, { ...mapping, machineId }),
    onSuccess: () => client.invalidateQueries({ queryKey: ["logs", logId] }),
  });
}
