"use client";

import { useQueryClient } from "@tanstack/react-query";
import { useRef, useState } from "react";
import { useAskBeforeLeaving } from "@/components/hooks/use-ask-before-leaving";
import { queryKeys } from "@/components/hooks/query-keys";
import type { FileState } from "@/components/upload/chosen-files";
import { forgetSending, noteSending } from "@/components/upload/lost-upload";
import { sameBytesLogId, uploadLog, UploadStopped } from "@/lib/api/upload-log";

export interface SeparateUploads {
  /** One entry a file; empty before the first was sent. */
  states: FileState[];
  isSending: boolean;
  send: (files: readonly File[], machineId: string | null) => void;
  stop: () => void;
  reset: () => void;
}

function stateOfFailure(error: unknown): FileState {
  const firstLogId = sameBytesLogId(error);
  if (error instanceof UploadStopped) return { step: "stopped" };
  return firstLogId ? { step: "same-bytes", firstLogId } : { step: "failed", error };
}

/** Sends files one after the other, each a log of its own; one that is refused does not hold up the others. */
export function useSeparateUploads(fieldId: string): SeparateUploads {
  const client = useQueryClient();
  const [states, setStates] = useState<FileState[]>([]);
  const [isSending, setSending] = useState(false);
  const running = useRef<AbortController | null>(null);
  useAskBeforeLeaving(isSending);

  const setState = (at: number, state: FileState) =>
    setStates((before) => before.map((other, index) => (index === at ? state : other)));
  const sendOne = async (file: File, at: number, machineId: string | null): Promise<FileState> => {
    const { signal } = running.current ?? new AbortController();
    if (signal.aborted) return { step: "stopped" };
    noteSending(fieldId, file.name);
    const onProgress = (share: number) => setState(at, { step: "sending", share });
    try {
      const { id } = await uploadLog({ fieldId, files: [file], machineId, onProgress, signal });
      return { step: "taken", logId: id };
    } catch (error) {
      return stateOfFailure(error);
    }
  };
  const sendAll = async (files: readonly File[], machineId: string | null) => {
    for (const [at, file] of files.entries()) {
      setState(at, { step: "sending", share: 0 });
      setState(at, await sendOne(file, at, machineId));
      void client.invalidateQueries({ queryKey: queryKeys.logs(fieldId) });
    }
    forgetSending(fieldId);
    setSending(false);
  };
  const send = (files: readonly File[], machineId: string | null) => {
    running.current = new AbortController();
    setStates(files.map(() => ({ step: "waiting" })));
    setSending(true);
    void sendAll(files, machineId);
  };
  return { states, isSending, send, stop: () => running.current?.abort(), reset: () => setStates([]) };
}
