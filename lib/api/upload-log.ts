import { ApiProblem } from "@/lib/api/api-problem";
import { logUploadPath } from "@/lib/api/client";
import { readProblem } from "@/lib/api/request-json";
import { LogAccepted } from "@/lib/schemas/logs";
import type { z } from "zod";

export interface LogUpload {
  fieldId: string;
  /** One, or the parts of one log. */
  files: readonly File[];
  machineId: string | null;
  /** Take it in although the same bytes are in this field already. */
  again?: boolean;
  /** Share of the bytes that have left this device, 0 to 1. */
  onProgress: (share: number) => void;
  signal: AbortSignal;
}

/** The person stopped the upload; nothing was kept. */
export class UploadStopped extends Error {}

/**
 * Sends the file or files of a log. XMLHttpRequest and not fetch, because only it tells how much has been sent.
 * @throws ApiProblem when the server refuses; UploadStopped when the person stops it; TypeError when the line breaks.
 */
export function uploadLog(upload: LogUpload): Promise<z.infer<typeof LogAccepted>> {
  const form = new FormData();
  // Fields before the file: a server that streams the body knows the machine before the bytes arrive.
  if (upload.machineId) form.set("machineId", upload.machineId);
  for (const file of upload.files) form.append("file", file, file.name);
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    request.open(
      "POST",
      logUploadPath(upload.fieldId, { again: upload.again ?? false, together: upload.files.length > 1 }),
    );
    request.setRequestHeader("accept", "application/json");
    request.upload.addEventListener("progress", (event) => {
      if (event.lengthComputable && event.total > 0) upload.onProgress(event.loaded / event.total);
    });
    request.addEventListener("load", () => {
      if (request.status >= 200 && request.status < 300) resolve(LogAccepted.parse(JSON.parse(request.responseText)));
      else reject(readProblem(request.status, request.responseText));
    });
    request.addEventListener("error", () => reject(new TypeError("the connection was lost while sending the file")));
    request.addEventListener("abort", () => reject(new UploadStopped("stopped by the person")));
    upload.signal.addEventListener("abort", () => request.abort(), { once: true });
    request.send(form);
  });
}

/** The id of the log that already holds the same bytes, when that is why the server refused. */
export function sameBytesLogId(error: unknown): string | null {
  if (!(error instanceof ApiProblem) || error.status !== 409) return null;
  const id = error.problem["logId"] ?? error.problem["id"];
  return typeof id === "string" ? id : null;
}
