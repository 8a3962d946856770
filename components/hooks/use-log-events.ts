"use client";

import { useQueryClient } from "@tanstack/react-query";
import { useEffect } from "react";
import { queryKeys } from "@/components/hooks/query-keys";
import { isWorking } from "@/components/upload/log-state";
import { getLog, logEventsPath } from "@/lib/api/client";
import { Log, type Log as LogBody } from "@/lib/schemas/logs";

const ASK_AGAIN_MS = 2_000;

/**
 * Keeps a log's entry in the query cache current while the server works on it: by server-sent events, and by asking
 * every two seconds where the stream cannot be held open.
 */
export function useLogEvents(log: LogBody | undefined): void {
  const client = useQueryClient();
  const logId = log?.id;
  const working = log ? isWorking(log.status) : false;

  useEffect(() => {
    if (!logId || !working) return;
    const store = (body: unknown) => {
      const parsed = Log.safeParse(body);
      if (parsed.success) client.setQueryData(queryKeys.log(logId), parsed.data);
    };
    let timer: ReturnType<typeof setInterval> | null = null;
    const source = new EventSource(logEventsPath(logId));
    source.onmessage = (event: MessageEvent<string>) => store(JSON.parse(event.data));
    source.onerror = () => {
      if (source.readyState !== EventSource.CLOSED || timer) return;
      timer = setInterval(() => void getLog(logId).then(store, () => undefined), ASK_AGAIN_MS);
    };
    return () => {
      source.close();
      if (timer) clearInterval(timer);
    };
  }, [client, logId, working]);
}
