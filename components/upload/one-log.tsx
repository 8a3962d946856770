"use client";

import { useRouter } from "next/navigation";
import type { ReactNode } from "react";
import { useLogUpload } from "@/components/hooks/use-log-upload";
import { formatBytes } from "@/components/ui/format-date";
import { ChosenFiles, partStates } from "@/components/upload/chosen-files";
import { UploadButtons, UploadWords } from "@/components/upload/upload-words";

export interface OneLogProps {
  fieldId: string;
  logsPath: string;
  /** One, or the parts of one log. */
  files: readonly File[];
  machineId: string | null;
  machineChoice: ReactNode;
  /** Shown until the files are on their way. */
  choices?: ReactNode;
  onAnother: () => void;
}

/** One log on its way, in a file or in several. */
export function OneLog({ fieldId, logsPath, files, machineId, machineChoice, choices, onAnother }: OneLogProps) {
  const router = useRouter();
  const { state, send, stop } = useLogUpload(fieldId, (logId) => router.push(`${logsPath}/${logId}`));
  const [only] = files;
  const isSending = state.step === "sending";
  return (
    <>
      {only && files.length === 1 ? (
        <p className="break-words">
          <span className="font-semibold">{only.name}</span>{" "}
          <span className="whitespace-nowrap text-ink-soft">{formatBytes(only.size)}</span>
        </p>
      ) : isSending ? (
        <ChosenFiles files={files} states={partStates(files, state.share)} logsPath={logsPath} />
      ) : null}
      {isSending ? null : choices}
      {isSending ? null : machineChoice}
      <UploadWords state={state} parts={files.length} />
      <div className="flex flex-wrap gap-2">
        <UploadButtons
          state={state}
          logsPath={logsPath}
          onSend={() => send(files, machineId, state.step === "same-bytes")}
          onStop={stop}
          onAnother={onAnother}
        />
      </div>
    </>
  );
}
