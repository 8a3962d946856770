import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeAll, beforeEach, describe, expect, it, vi } from "vitest";
import { queryKeys } from "@/components/hooks/query-keys";
import { partStates } from "@/components/upload/chosen-files";
import { LogFacts } from "@/components/upload/log-facts";
import { LogUpload } from "@/components/upload/log-upload";
import { forgetSending } from "@/components/upload/lost-upload";
import { ApiProblem } from "@/lib/api/api-problem";
import type * as UploadLog from "@/lib/api/upload-log";
import { makeLogReply } from "@/tests/components/upload/make-log-reply";

const push = vi.hoisted(() => vi.fn());
vi.mock("next/navigation", () => ({ useRouter: () => ({ push }) }));
const sending = vi.hoisted(() => ({ answer: vi.fn<(upload: UploadLog.LogUpload) => Promise<{ id: string }>>() }));
vi.mock("@/lib/api/upload-log", async (original) => ({
  ...(await original<typeof UploadLog>()),
  uploadLog: (upload: UploadLog.LogUpload) => sending.answer(upload),
}));

// The readers load when files are looked at; that takes longer than a query waits.
beforeAll(async () => {
  await import("@/lib/ingest/propose-grouping");
});
beforeEach(() => {
  sending.answer.mockReset();
  push.mockReset();
  forgetSending("fld_1");
});
afterEach(cleanup);

const line = (second: number) => `2031-09-20T08:00:${String(second).padStart(2, "0")}Z,-98.61,38.4${second},200\n`;
const text = (from: number, to: number) =>
  `time,longitude,latitude,downforce N\n${Array.from({ length: to - from }, (_, i) => line(from + i)).join("")}`;
/** The test's own File cannot be read in slices. */
function fileOf(name: string, content: string): File {
  const file = new File([content], name);
  const bytes = new TextEncoder().encode(content);
  file.slice = (from = 0, to = bytes.length) =>
    ({ arrayBuffer: async () => bytes.slice(from, to).buffer }) as unknown as Blob;
  return file;
}
const PARTS = [fileOf("part-1.csv", text(10, 20)), fileOf("part-2.csv", text(20, 30))];
const OTHERS = [fileOf("east.csv", text(10, 30)), fileOf("west.csv", text(15, 35))];

async function choose(files: File[]): Promise<void> {
  const client = new QueryClient({ defaultOptions: { queries: { staleTime: Infinity, retry: false } } });
  client.setQueryData(queryKeys.machines, { items: [], nextCursor: null });
  render(
    <QueryClientProvider client={client}>
      <LogUpload fieldId="fld_1" logsPath="/larkspur/fields/fld_1/logs" exampleHref={null} />
    </QueryClientProvider>,
  );
  await userEvent.upload(screen.getByLabelText("Choose a log file"), files);
}

describe("several files chosen at once", () => {
  it("that follow each other are proposed as one log, with the reason, and leave in one form", async () => {
    let settle: (accepted: { id: string }) => void = () => undefined;
    sending.answer.mockReturnValue(new Promise((resolve) => (settle = resolve)));
    await choose(PARTS);
    expect(await screen.findByText(/same columns and follow each other/)).toBeInTheDocument();
    expect(screen.getByRole("radio", { name: "One log in parts" })).toBeChecked();
    await userEvent.click(screen.getByRole("button", { name: "Take it in" }));
    expect(sending.answer).toHaveBeenCalledTimes(1);
    expect(sending.answer.mock.calls[0]?.[0].files.map((file) => file.name)).toEqual(["part-1.csv", "part-2.csv"]);
    expect(screen.getAllByRole("list", { name: "Chosen files" })).toHaveLength(1);
    expect(screen.queryByRole("radio")).toBeNull();
    settle({ id: "log_joined" });
    await vi.waitFor(() => expect(push).toHaveBeenCalledWith("/larkspur/fields/fld_1/logs/log_joined"));
  });

  it("leave in the order they were logged, so that the first of them names the log", async () => {
    sending.answer.mockResolvedValue({ id: "log_joined" });
    const third = fileOf("part-3.csv", text(30, 40));
    await choose([third, ...PARTS]);
    expect(await screen.findByText(/same columns and follow each other/)).toBeInTheDocument();
    await userEvent.click(screen.getByRole("button", { name: "Take it in" }));
    const names = sending.answer.mock.calls[0]?.[0].files.map((file) => file.name);
    expect(names).toEqual(["part-1.csv", "part-2.csv", "part-3.csv"]);
  });

  it("that were logged at once are proposed as separate logs; one that is refused does not stop the others", async () => {
    const refusal = { type: "about:blank", title: "Refused", status: 415, detail: "No log.", code: "x" };
    sending.answer.mockRejectedValueOnce(new ApiProblem(refusal)).mockResolvedValueOnce({ id: "log_west" });
    await choose(OTHERS);
    await userEvent.click(await screen.findByRole("button", { name: "Take in 2 logs" }));
    const [east, west] = within(screen.getByRole("list", { name: "Chosen files" })).getAllByRole("listitem");
    expect(await within(east!).findByText(/Not taken in: .*No log/)).toBeInTheDocument();
    expect(await within(west!).findByRole("link")).toHaveAttribute("href", "/larkspur/fields/fld_1/logs/log_west");
    expect(screen.getByRole("status")).toHaveTextContent("1 of 2 taken in.");
    expect(sending.answer.mock.calls.map(([upload]) => upload.files.length)).toEqual([1, 1]);
  });

  it("follow what the person says, and can be left out one by one", async () => {
    await choose(PARTS);
    await userEvent.click(await screen.findByRole("radio", { name: "Separate logs" }));
    expect(screen.getByRole("button", { name: "Take in 2 logs" })).toBeInTheDocument();
    await userEvent.click(screen.getByRole("button", { name: "Leave out part-2.csv" }));
    expect(screen.queryByRole("radio")).toBeNull();
    expect(screen.getByText("part-1.csv")).toBeInTheDocument();
  });

  it("show how far each is while one form carries them all", () => {
    const files = [new File(["a".repeat(60)], "a"), new File(["b".repeat(40)], "b")];
    expect(partStates(files, 0.3)).toEqual([{ step: "sending", share: 0.5 }, { step: "waiting" }]);
    expect(partStates(files, 0.8)).toEqual([
      { step: "taken", logId: null },
      { step: "sending", share: 0.5 },
    ]);
    expect(partStates(files, 1).map(({ step }) => step)).toEqual(["taken", "taken"]);
  });
});

describe("the facts of a log in several files", () => {
  it("name each file with its records, and give it back", () => {
    const file = { bytes: 2048, records: 40, copies: [] };
    const files = [
      { ...file, name: "part-1.csv", sha256: "aa" },
      { ...file, name: "part-2.csv", sha256: "bb", copies: ["again.csv"] },
    ];
    render(<LogFacts log={makeLogReply({ id: "log_1", files })} />);
    expect(screen.getByRole("link", { name: "part-2.csv" })).toHaveAttribute(
      "href",
      "/api/v1/logs/log_1/original?sha256=bb",
    );
    expect(screen.getByText(/40 records, sent 2 times/)).toBeInTheDocument();
  });

  it("name the file whose line a note speaks of", () => {
    const note = { code: "ragged-rows", count: 2, firstLine: 185, message: "2 lines were left out." };
    const { unmount } = render(<LogFacts log={makeLogReply({ notes: [{ ...note, file: "part-2.csv" }] })} />);
    expect(screen.getByText("First at line 185 of part-2.csv.")).toBeInTheDocument();
    unmount();
    render(<LogFacts log={makeLogReply({ notes: [note] })} />);
    expect(screen.getByText("First at line 185.")).toBeInTheDocument();
  });
});
