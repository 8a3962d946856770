"use client";

import { useQueryClient } from "@tanstack/react-query";
import { useEffect, useRef, useState } from "react";
import { queryKeys } from "@/components/hooks/query-keys";
import { forgetSending, noteSending } from "@/components/upload/lost-upload";
import { sameBytesLogId, uploadLog, UploadStopped } from "@/lib/api/upload-log";

export type UploadState =
  | { step: "idle" }
  | { step: "sending"; share: number }
  | { step: "same-bytes"; firstLogId: string }
  | { step: "failed"; error: unknown }
  | { step: "stopped" };

export interface LogUploadRun {
  state: UploadState;
  send: (file: File, machineId: string | null, again?: boolean) => void;
  stop: () => void;
  reset: () => void;
}

/** One upload at a time to one field. `onTaken` gets the id of the new log. */
export function useLogUpload(fieldId: string, onTaken: (logId: string) => void): LogUploadRun {
  const client = useQueryClient();
  const [state, setState] = useState<UploadState>({ step: "idle" });
  const running = useRef<AbortController | null>(null);

  const isSending = state.step === "sending";
  useEffect(() => {
    if (!isSending) return;
    // The browser asks in its own words whether to leave.
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener("beforeunload", ask);
    return () => window.removeEventListener("beforeunload", ask);
  }, [isSending]);

  const fail = (error: unknown) => {
    forgetSending(fieldId);
    const firstLogId = sameBytesLogId(error);
    if (error instanceof UploadStopped) setState({ step: "stopped" });
    else if (firstLogId) setState({ step: "same-bytes", firstLogId });
    else setState({ step: "failed", error });
  };
  const send = (file: File, machineId: string | null, again = false) => {
    const controller = new AbortController();
    running.current = controller;
    setState({ step: "sending", share: 0 });
    noteSending(fieldId, file.name);
    const onProgress = (share: number) => setState({ step: "sending", share });
    uploadLog({ fieldId, file, machineId, again, onProgress, signal: controller.signal }).then((accepted) => {
      forgetSending(fieldId);
      void client.invalidateQueries({ queryKey: queryKeys.logs(fieldId) });
      onTaken(accepted.id);
    }, fail);
  };
  return { state, send, stop: () => running.current?.abort(), reset: () => setState({ step: "idle" }) };
}
