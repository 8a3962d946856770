"use client";

import { useState } from "react";
import { useFileGrouping } from "@/components/hooks/use-file-grouping";
import { useSeparateUploads } from "@/components/hooks/use-separate-uploads";
import { Button } from "@/components/ui/button";
import { ChosenFiles } from "@/components/upload/chosen-files";
import { GroupingChoice } from "@/components/upload/grouping-choice";
import { OneLog, type OneLogProps } from "@/components/upload/one-log";

export interface SeveralFilesProps extends OneLogProps {
  onFiles: (files: File[]) => void;
}

/** Several files chosen at once: parts of one log, or logs of their own. */
export function SeveralFiles({ files, onFiles, ...shared }: SeveralFilesProps) {
  const [said, setSaid] = useState<boolean | null>(null);
  const proposal = useFileGrouping(files);
  const uploads = useSeparateUploads(shared.fieldId);
  const together = said ?? proposal?.together ?? null;
  const isUnderWay = uploads.states.length > 0;
  const remove = (file: File) => onFiles(files.filter((other) => other !== file));
  const choices = (
    <>
      <ChosenFiles
        files={files}
        states={uploads.states}
        logsPath={shared.logsPath}
        onRemove={isUnderWay ? undefined : remove}
      />
      {isUnderWay ? null : <GroupingChoice proposal={proposal} together={together} onChange={setSaid} />}
    </>
  );
  // The log takes its name and the sample of its columns from the file sent first.
  if (together) return <OneLog files={inOrder(files, proposal?.order)} {...shared} choices={choices} />;
  return (
    <>
      {choices}
      {together === false ? <SeparateLogs files={files} uploads={uploads} {...shared} /> : null}
    </>
  );
}

function inOrder(files: readonly File[], order: readonly number[] | undefined): readonly File[] {
  return order ? order.flatMap((index) => files[index] ?? []) : files;
}

interface SeparateLogsProps extends OneLogProps {
  uploads: ReturnType<typeof useSeparateUploads>;
}

function SeparateLogs({ files, uploads, machineId, machineChoice, onAnother }: SeparateLogsProps) {
  const { states, isSending, send, stop } = uploads;
  const taken = states.filter(({ step }) => step === "taken").length;
  if (states.length === 0) {
    return (
      <>
        {machineChoice}
        <div className="flex flex-wrap gap-2">
          <Button kind="primary" onClick={() => send(files, machineId)}>
            Take in {files.length} logs
          </Button>
          <Button kind="quiet" onClick={onAnother}>
            Choose other files
          </Button>
        </div>
      </>
    );
  }
  return (
    <>
      <p role="status">
        {taken} of {files.length} taken in.{isSending ? " Keep this page open until all are there." : ""}
      </p>
      <div className="flex flex-wrap gap-2">
        {isSending ? (
          <Button onClick={stop}>Stop sending</Button>
        ) : (
          <Button kind="primary" onClick={onAnother}>
            Choose more files
          </Button>
        )}
      </div>
    </>
  );
}
