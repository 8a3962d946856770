"use client";

import Link from "next/link";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { useLogUpload, type UploadState } from "@/components/hooks/use-log-upload";
import { useMachines } from "@/components/hooks/use-machines";
import { Button, buttonClass } from "@/components/ui/button";
import { formatBytes } from "@/components/ui/format-date";
import { Notice } from "@/components/ui/notice";
import { ProgressBar } from "@/components/ui/progress-bar";
import { DropZone } from "@/components/upload/drop-zone";
import { takeDroppedFile } from "@/components/upload/dropped-file";
import { LOG_FILE_KINDS } from "@/components/upload/log-state";
import { MachineChoice } from "@/components/upload/machine-choice";
import { describeFailure } from "@/lib/api/api-problem";

export interface LogUploadProps {
  fieldId: string;
  /** `/org/fields/fld_…/logs`. */
  logsPath: string;
  /** Demo mode only: a file to try with. */
  exampleHref: string | null;
}

/** Choose or drop a file, say which machine made it, watch it leave. */
export function LogUpload({ fieldId, logsPath, exampleHref }: LogUploadProps) {
  const router = useRouter();
  const machines = useMachines();
  const [file, setFile] = useState<File | null>(() => takeDroppedFile(fieldId));
  const [machineId, setMachineId] = useState("");
  const upload = useLogUpload(fieldId, (logId) => router.push(`${logsPath}/${logId}`));
  const { state } = upload;
  const busy = state.step === "sending";

  if (!file) {
    return (
      <div className="space-y-2">
        <DropZone
          words="Choose a log file, or drop it anywhere on this page"
          hint="CSV, GeoJSON, a zipped shapefile or zipped ISO 11783-10 task data; .gz is fine"
          accept={LOG_FILE_KINDS}
          wholePage
          onFile={setFile}
        />
        {exampleHref ? (
          <p className="text-table text-ink-soft">
            Nothing at hand?{" "}
            <a href={exampleHref} download className="inline-flex min-h-8 items-center">
              Take the example log
            </a>{" "}
            and drop it here.
          </p>
        ) : null}
      </div>
    );
  }
  return (
    <section aria-label="Take in a log" className="sheet max-w-2xl space-y-4 p-4">
      <p className="break-words">
        <span className="font-semibold">{file.name}</span>{" "}
        <span className="whitespace-nowrap text-ink-soft">{formatBytes(file.size)}</span>
      </p>
      {busy ? null : <MachineChoice machines={machines.data?.items ?? []} value={machineId} onChange={setMachineId} />}
      <UploadWords state={state} logsPath={logsPath} />
      <div className="flex flex-wrap gap-2">
        {busy ? (
          <Button onClick={upload.stop}>Stop sending</Button>
        ) : (
          <>
            <Button kind="primary" onClick={() => upload.send(file, machineId || null, state.step === "same-bytes")}>
              {sendWords(state)}
            </Button>
            <Button
              kind="quiet"
              onClick={() => {
                upload.reset();
                setFile(null);
              }}
            >
              Another file
            </Button>
          </>
        )}
      </div>
    </section>
  );
}

function sendWords(state: UploadState): string {
  if (state.step === "same-bytes") return "Take it in again";
  return state.step === "failed" || state.step === "stopped" ? "Try again" : "Take it in";
}

function UploadWords({ state, logsPath }: { state: UploadState; logsPath: string }) {
  if (state.step === "sending") {
    const percent = Math.round(state.share * 100);
    return (
      <div className="space-y-1">
        <ProgressBar share={state.share} label="Sent" />
        <p role="status" className="tabular text-table text-ink-soft">
          {percent < 100
            ? `${percent} % sent. Keep this page open until it is all there.`
            : "All sent. The server is keeping it."}
        </p>
      </div>
    );
  }
  if (state.step === "same-bytes") {
    return (
      <Notice state="look" urgent title="This file is here already">
        <p>The same bytes were taken into this field before. Open that log, or take it in a second time.</p>
        <p className="pt-2">
          <Link href={`${logsPath}/${state.firstLogId}`} className={buttonClass("plain")}>
            Open the first one
          </Link>
        </p>
      </Notice>
    );
  }
  if (state.step === "failed") {
    return (
      <Notice state="act" urgent title="The file was not taken in">
        {describeFailure(state.error)}
      </Notice>
    );
  }
  return state.step === "stopped" ? <Notice state="none">Stopped. Nothing was kept.</Notice> : null;
}
