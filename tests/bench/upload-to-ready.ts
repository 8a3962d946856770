import type { BenchContext } from "@/tests/bench/bench-context";
import { diskBlob, type BenchFile } from "@/tests/bench/bench-files";

const LOOK_MS = 4;

export interface ReadyUpload {
  ms: number;
  /** Until the upload was answered. */
  postMs: number;
  logId: string;
}

/** Milliseconds from the first byte sent to a log that is ready: stored, placed, described, committed. */
export async function uploadToReady(context: BenchContext, file: BenchFile): Promise<ReadyUpload> {
  const { server, cookie, fieldId, machineId } = context;
  const form = new FormData();
  form.set("mapping", JSON.stringify(file.mapping));
  form.set("machineId", machineId);
  form.set("file", await diskBlob(file), file.name);
  const started = performance.now();
  const response = await fetch(`${server.baseUrl}/api/v1/fields/${fieldId}/logs?again=1`, {
    method: "POST",
    headers: { cookie, origin: server.baseUrl },
    body: form,
  });
  const body = (await response.json()) as { id: string };
  const postMs = performance.now() - started;
  if (response.status !== 202) throw new Error(`upload: ${response.status} ${JSON.stringify(body)}`);
  await untilReady(context, body.id);
  return { ms: performance.now() - started, postMs, logId: body.id };
}

async function untilReady({ database }: BenchContext, logId: string): Promise<void> {
  for (;;) {
    const { rows } = await database.query<{ status: string; error: unknown }>(
      "select status, error from logs where id = $1",
      [logId],
    );
    const status = rows[0]?.status;
    if (status === "ready") return;
    if (status !== "queued" && status !== "reading" && status !== "building") {
      throw new Error(`the log ended as ${status}: ${JSON.stringify(rows[0]?.error)}`);
    }
    await new Promise((resolve) => setTimeout(resolve, LOOK_MS));
  }
}
