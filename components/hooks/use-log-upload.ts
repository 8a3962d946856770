"use client";

import { useQueryClient } from "@tanstack/react-query";
import { useRef, useState } from "react";
import { useAskBeforeLeaving } from "@/components/hooks/use-ask-before-leaving";
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
  send: (files: readonly File[], machineId: string | null, again?: boolean) => void;
  stop: () => void;
  reset: () => void;
}

/** One upload at a time to one field: one file, or the parts of one log. `onTaken` gets the id of the new log. */
export function useLogUpload(fieldId: string, onTaken: (logId: string) => void): LogUploadRun {
  const client = useQueryClient();
  const [state, setState] = useState<UploadState>({ step: "idle" });
  const running = useRef<AbortController | null>(null);

  useAskBeforeLeaving(state.step === "sending");

  const fail = (error: unknown) => {
    forgetSending(fieldId);
    const firstLogId = sameBytesLogId(error);
    if (error instanceof UploadStopped) setState({ step: "stopped" });
    else if (firstLogId) setState({ step: "same-bytes", firstLogId });
    else setState({ step: "failed", error });
  };
  const send = (files: readonly File[], machineId: string | null, again = false) => {
    const controller = new AbortController();
    running.current = controller;
    setState({ step: "sending", share: 0 });
    noteSending(fieldId, files[0]?.name ?? "");
    const onProgress = (share: number) => setState({ step: "sending", share });
    uploadLog({ fieldId, files, machineId, again, onProgress, signal: controller.signal }).then((accepted) => {
      forgetSending(fieldId);
      void client.invalidateQueries({ queryKey: queryKeys.logs(fieldId) });
      onTaken(accepted.id);
    }, fail);
  };
  return { state, send, stop: () => running.current?.abort(), reset: () => setState({ step: "idle" }) };
}
