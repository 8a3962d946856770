import { afterEach, describe, expect, it, vi } from "vitest";
import { ApiProblem } from "@/lib/api/api-problem";
import { sameBytesLogId, uploadLog, UploadStopped } from "@/lib/api/upload-log";

/** Stands in for the browser's own: the test says what the server does. */
class FakeRequest extends EventTarget {
  static last: FakeRequest;
  upload = new EventTarget();
  status = 0;
  responseText = "";
  path = "";
  body: FormData | null = null;
  constructor() {
    super();
    FakeRequest.last = this;
  }
  open(_method: string, path: string) {
    this.path = path;
  }
  setRequestHeader() {}
  send(body: FormData) {
    this.body = body;
  }
  abort() {
    this.dispatchEvent(new Event("abort"));
  }
  answer(status: number, body: unknown) {
    this.status = status;
    this.responseText = JSON.stringify(body);
    this.dispatchEvent(new Event("load"));
  }
}

afterEach(() => vi.unstubAllGlobals());

function begin(again = false, names = ["pass.csv"]) {
  vi.stubGlobal("XMLHttpRequest", FakeRequest);
  const controller = new AbortController();
  const shares: number[] = [];
  const files = names.map((name) => new File(["a,b"], name));
  const onProgress = (share: number) => shares.push(share);
  const sending = uploadLog({
    fieldId: "fld_1",
    files,
    machineId: "mac_1",
    again,
    onProgress,
    signal: controller.signal,
  });
  return { sending, controller, shares, request: FakeRequest.last };
}

describe("sending a log in parts", () => {
  it("puts all of them into one form and says that they belong together", async () => {
    const { request, sending } = begin(true, ["a.csv", "b.csv"]);
    expect(request.path).toBe("/api/v1/fields/fld_1/logs?again=1&together=1");
    expect(request.body?.getAll("file").map((file) => (file as File).name)).toEqual(["a.csv", "b.csv"]);
    request.answer(202, { id: "log_1", status: "queued" });
    await sending;
  });
});

describe("sending a log", () => {
  it("tells how much has left, and gives the id of the log", async () => {
    const { sending, shares, request } = begin();
    request.upload.dispatchEvent(new ProgressEvent("progress", { lengthComputable: true, loaded: 3, total: 4 }));
    request.answer(202, { id: "log_1", status: "queued" });
    expect(await sending).toEqual({ id: "log_1", status: "queued" });
    expect(shares).toEqual([0.75]);
    // The machine comes before the file, so that a streaming server knows it in time.
    expect([...(request.body?.keys() ?? [])]).toEqual(["machineId", "file"]);
  });

  it("names the log that holds the same bytes, and can take it in again", async () => {
    const problem = {
      type: "x",
      title: "Conflict",
      status: 409,
      detail: "Here already.",
      code: "same_bytes",
      id: "log_first",
    };
    const { sending, request } = begin();
    request.answer(409, problem);
    const error = await sending.catch((caught: unknown) => caught);
    expect(sameBytesLogId(error)).toBe("log_first");
    const { request: second, sending: again } = begin(true);
    expect(second.path).toContain("again=1");
    second.answer(202, { id: "log_2", status: "queued" });
    await again;
  });

  it("tells a broken line from a stop and from a refusal", async () => {
    const lost = begin();
    lost.request.dispatchEvent(new Event("error"));
    await expect(lost.sending).rejects.toBeInstanceOf(TypeError);
    const stopped = begin();
    stopped.controller.abort();
    await expect(stopped.sending).rejects.toBeInstanceOf(UploadStopped);
    const refused = begin();
    refused.request.answer(413, {
      type: "x",
      title: "Too large",
      status: 413,
      detail: "At most 1 GB.",
      code: "too_large",
    });
    const error = await refused.sending.catch((caught: unknown) => caught);
    expect(error instanceof ApiProblem && error.message).toBe("At most 1 GB.");
  });
});
