"use client";

import { useRouter } from "next/navigation";
import { useState, useSyncExternalStore } from "react";
import { useLogUpload } from "@/components/hooks/use-log-upload";
import { useMachines } from "@/components/hooks/use-machines";
import { formatBytes } from "@/components/ui/format-date";
import { Notice } from "@/components/ui/notice";
import { DropZone } from "@/components/upload/drop-zone";
import { takeDroppedFile } from "@/components/upload/dropped-file";
import { LOG_FILE_KINDS } from "@/components/upload/log-state";
import { findLostUpload, forgetSending } from "@/components/upload/lost-upload";
import { MachineChoice } from "@/components/upload/machine-choice";
import { UploadButtons, UploadWords } from "@/components/upload/upload-words";

export interface LogUploadProps {
  fieldId: string;
  /** `/org/fields/fld_…/logs`. */
  logsPath: string;
  /** Demo mode only: a file to try with. */
  exampleHref: string | null;
  /** The machine of the field's last seeding log. */
  lastMachineId?: string | null;
}

/** Choose or drop a file, say which machine made it, watch it leave. */
export function LogUpload({ fieldId, logsPath, exampleHref, lastMachineId = null }: LogUploadProps) {
  const router = useRouter();
  const machines = useMachines().data?.items ?? [];
  const [file, setFile] = useState<File | null>(() => takeDroppedFile(fieldId));
  const [chosen, setChosen] = useState<string | null>(null);
  const upload = useLogUpload(fieldId, (logId) => router.push(`${logsPath}/${logId}`));
  const { state } = upload;
  // Until the person says otherwise: as last time, if that machine is still there.
  const machineId = chosen ?? machines.find((machine) => machine.id === lastMachineId)?.id ?? "";

  const choose = (next: File | null) => {
    forgetSending(fieldId);
    upload.reset();
    setFile(next);
  };
  if (!file) return <FileChoice fieldId={fieldId} exampleHref={exampleHref} onFile={choose} />;
  return (
    <section aria-label="Take in a log" className="sheet max-w-2xl space-y-4 p-4">
      <p className="break-words">
        <span className="font-semibold">{file.name}</span>{" "}
        <span className="whitespace-nowrap text-ink-soft">{formatBytes(file.size)}</span>
      </p>
      {state.step === "sending" ? null : (
        <MachineChoice machines={machines} value={machineId} onChange={setChosen} lastMachineId={lastMachineId} />
      )}
      <UploadWords state={state} />
      <div className="flex flex-wrap gap-2">
        <UploadButtons
          state={state}
          logsPath={logsPath}
          onSend={() => upload.send(file, machineId || null, state.step === "same-bytes")}
          onStop={upload.stop}
          onAnother={() => choose(null)}
        />
      </div>
    </section>
  );
}

const NEVER = () => () => undefined;

interface FileChoiceProps {
  fieldId: string;
  exampleHref: string | null;
  onFile: (file: File) => void;
}

function FileChoice({ fieldId, exampleHref, onFile }: FileChoiceProps) {
  const lost = useSyncExternalStore(
    NEVER,
    () => findLostUpload(fieldId),
    () => null,
  );
  return (
    <div className="space-y-2">
      {lost === null ? null : (
        <Notice state="look" urgent title={`${lost} was still being sent when this page was left`}>
          If it is not in the list below, it was not taken in: choose it again.
        </Notice>
      )}
      <DropZone
        words="Choose a log file"
        dropWords=", or drop it anywhere on this page"
        hint="CSV, GeoJSON, a zipped shapefile or zipped ISO 11783-10 task data; .gz is fine"
        accept={LOG_FILE_KINDS}
        wholePage
        onFile={onFile}
      />
      {exampleHref ? (
        <p className="text-table text-ink-soft">
          Nothing at hand?{" "}
          <a href={exampleHref} download className="inline-flex min-h-8 items-center">
            Take the example log
          </a>{" "}
          and <span className="md:hidden">choose it here.</span>
          <span className="max-md:hidden">drop it here.</span>
        </p>
      ) : null}
    </div>
  );
}
