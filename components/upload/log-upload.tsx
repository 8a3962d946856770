"use client";

import { useState, useSyncExternalStore } from "react";
import { useMachines } from "@/components/hooks/use-machines";
import { Notice } from "@/components/ui/notice";
import { DropZone } from "@/components/upload/drop-zone";
import { takeDroppedFiles } from "@/components/upload/dropped-files";
import { LOG_FILE_KINDS } from "@/components/upload/log-state";
import { findLostUpload, forgetSending } from "@/components/upload/lost-upload";
import { MachineChoice } from "@/components/upload/machine-choice";
import { OneLog } from "@/components/upload/one-log";
import { SeveralFiles } from "@/components/upload/several-files";

export interface LogUploadProps {
  fieldId: string;
  /** `/org/fields/fld_…/logs`. */
  logsPath: string;
  /** Demo mode only: a file to try with. */
  exampleHref: string | null;
  /** The machine of the field's last seeding log. */
  lastMachineId?: string | null;
}

/** Choose or drop files, say which machine made them and whether they are one log, watch them leave. */
export function LogUpload({ fieldId, logsPath, exampleHref, lastMachineId = null }: LogUploadProps) {
  const machines = useMachines().data?.items ?? [];
  const [files, setFiles] = useState<File[]>(() => takeDroppedFiles(fieldId));
  const [chosen, setChosen] = useState<string | null>(null);
  // Until the person says otherwise: as last time, if that machine is still there.
  const machineId = chosen ?? machines.find((machine) => machine.id === lastMachineId)?.id ?? "";

  const choose = (next: File[]) => {
    forgetSending(fieldId);
    setFiles(next);
  };
  if (files.length === 0) return <FileChoice fieldId={fieldId} exampleHref={exampleHref} onFiles={choose} />;
  const machineChoice = (
    <MachineChoice machines={machines} value={machineId} onChange={setChosen} lastMachineId={lastMachineId} />
  );
  const shared = { fieldId, logsPath, machineId: machineId || null, machineChoice, onAnother: () => choose([]) };
  return (
    <section aria-label="Take in a log" className="sheet max-w-2xl space-y-4 p-4">
      {files.length === 1 ? (
        <OneLog files={files} {...shared} />
      ) : (
        <SeveralFiles files={files} onFiles={choose} {...shared} />
      )}
    </section>
  );
}

const NEVER = () => () => undefined;

interface FileChoiceProps {
  fieldId: string;
  exampleHref: string | null;
  onFiles: (files: File[]) => void;
}

function FileChoice({ fieldId, exampleHref, onFiles }: FileChoiceProps) {
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
        hint="CSV, GeoJSON, a zipped shapefile or zipped ISO 11783-10 task data; .gz is fine, and several files at once"
        accept={LOG_FILE_KINDS}
        wholePage
        multiple
        onFiles={onFiles}
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
