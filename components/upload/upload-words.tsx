import Link from "next/link";
import type { UploadState } from "@/components/hooks/use-log-upload";
import { Button, buttonClass } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { ProgressBar } from "@/components/ui/progress-bar";
import { ApiProblem, describeFailure } from "@/lib/api/api-problem";

/** How the sending stands, in words. */
export function UploadWords({ state, parts = 1 }: { state: UploadState; parts?: number }) {
  const isOne = parts === 1;
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
      <Notice state="look" urgent title={`${isOne ? "This file is" : "These files are"} already in this field.`}>
        Open the log that was made of {isOne ? "it" : "them"}, or take {isOne ? "the file" : "the files"} in a second
        time.
      </Notice>
    );
  }
  if (state.step === "failed") {
    return (
      <Notice state="act" urgent title={isOne ? "The file was not taken in" : "The files were not taken in"}>
        {describeFailure(state.error)}
      </Notice>
    );
  }
  return state.step === "stopped" ? <Notice state="none">Stopped. Nothing was kept.</Notice> : null;
}

/** Statuses that speak of the file itself: the same file would be refused again. */
const FILE_REFUSED = new Set([400, 413, 415, 422]);

function isFileRefused(state: UploadState): boolean {
  return state.step === "failed" && state.error instanceof ApiProblem && FILE_REFUSED.has(state.error.status);
}

export interface UploadButtonsProps {
  state: UploadState;
  logsPath: string;
  onSend: () => void;
  onStop: () => void;
  onAnother: () => void;
}

/** What to do next: the button that helps most stands first and alone is dark. */
export function UploadButtons({ state, logsPath, onSend, onStop, onAnother }: UploadButtonsProps) {
  if (state.step === "sending") return <Button onClick={onStop}>Stop sending</Button>;
  if (isFileRefused(state)) {
    return (
      <Button kind="primary" onClick={onAnother}>
        Choose another file
      </Button>
    );
  }
  if (state.step === "same-bytes") {
    return (
      <>
        <Link href={`${logsPath}/${state.firstLogId}`} className={buttonClass("primary")}>
          Open the first one
        </Link>
        <Button onClick={onSend}>Take it in again</Button>
        <Button kind="quiet" onClick={onAnother}>
          Choose another file
        </Button>
      </>
    );
  }
  return (
    <>
      <Button kind="primary" onClick={onSend}>
        {state.step === "failed" || state.step === "stopped" ? "Try again" : "Take it in"}
      </Button>
      <Button kind="quiet" onClick={onAnother}>
        Choose another file
      </Button>
    </>
  );
}
