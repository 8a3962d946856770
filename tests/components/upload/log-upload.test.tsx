import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, fireEvent, render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { queryKeys } from "@/components/hooks/query-keys";
import { LogUpload } from "@/components/upload/log-upload";
import { lastSeedingMachine } from "@/components/upload/logs-page";
import { forgetSending } from "@/components/upload/lost-upload";
import { ApiProblem } from "@/lib/api/api-problem";
import type * as UploadLog from "@/lib/api/upload-log";
import type { MachineReply } from "@/lib/schemas/machines";
import { makeLogReply } from "@/tests/components/upload/make-log-reply";

vi.mock("next/navigation", () => ({ useRouter: () => ({ push: vi.fn() }) }));
const sending = vi.hoisted(() => ({ answer: vi.fn<() => Promise<{ id: string }>>() }));
vi.mock("@/lib/api/upload-log", async (original) => ({
  ...(await original<typeof UploadLog>()),
  uploadLog: () => sending.answer(),
}));

const at = { createdAt: "2031-09-01T00:00:00.000Z", updatedAt: "2031-09-01T00:00:00.000Z" };
const drill = {
  kind: "seeder",
  rowCount: 12,
  rowSpacingM: 0.75,
  antennaToRowsM: 4,
  antennaRightM: 0,
  hitch: "rigid",
  rowUnitMassKg: 90,
} as const;
const frame = { massKg: 4000, behindHitchM: 3, wheelsBehindHitchM: 4, rowsBehindHitchM: 5, minWheelLoadN: 0 };
const MACHINES: MachineReply[] = [
  { ...drill, ...at, id: "mac_light", name: "Larkspur drill", frame: { ...frame, ballast: [] } },
  {
    ...drill,
    ...at,
    id: "mac_heavy",
    name: "Larkspur drill 2",
    frame: { ...frame, ballast: [{ massKg: 600, behindHitchM: 3 }] },
  },
];

beforeEach(() => {
  sending.answer.mockReset();
  forgetSending("fld_1");
});
afterEach(cleanup);

function show(lastMachineId: string | null = null) {
  const client = new QueryClient({ defaultOptions: { queries: { staleTime: Infinity, retry: false } } });
  client.setQueryData(queryKeys.machines, { items: MACHINES, nextCursor: null });
  return render(
    <QueryClientProvider client={client}>
      <LogUpload
        fieldId="fld_1"
        logsPath="/larkspur/fields/fld_1/logs"
        exampleHref={null}
        lastMachineId={lastMachineId}
      />
    </QueryClientProvider>,
  );
}

async function chooseFile(name = "pass.tsv"): Promise<void> {
  await userEvent.upload(screen.getByLabelText("Choose a log file"), new File(["a\tb"], name));
}

const take = () => userEvent.click(screen.getByRole("button", { name: "Take it in" }));

function problem(status: number, extra: Record<string, unknown> = {}): ApiProblem {
  return new ApiProblem({ type: "about:blank", title: "Refused", status, detail: "Refused.", code: "x", ...extra });
}

/** Whether the browser would ask before the page is left. */
function asksBeforeLeaving(): boolean {
  const event = new Event("beforeunload", { cancelable: true });
  window.dispatchEvent(event);
  return event.defaultPrevented;
}

describe("the machine of an upload", () => {
  it("is as last time, and near-equal machines are told apart", async () => {
    show("mac_heavy");
    await chooseFile();
    const select = screen.getByLabelText("Machine that made the log");
    expect(select).toHaveValue("mac_heavy");
    expect(screen.getByText(/^As last time in this field/)).toBeInTheDocument();
    const words = screen.getAllByRole("option").map((option) => option.textContent);
    expect(words[1]).toMatch(/^Larkspur drill \(9(\.0+)?\sm wide, 12 rows, no ballast\)$/);
    expect(words[2]).toMatch(/^Larkspur drill 2 \(9(\.0+)?\sm wide, 12 rows, ballast 600\skg\)$/);
  });

  it("when none is chosen, says what will not be known", async () => {
    show("mac_gone");
    await chooseFile();
    expect(screen.getByLabelText("Machine that made the log")).toHaveValue("");
    expect(screen.getByText(/how much weight is left is not known/)).toBeInTheDocument();
  });

  it("of last time is that of the newest seeding log that has one", () => {
    const logs = [
      makeLogReply({ machineId: null }),
      makeLogReply({ kind: "harvest", machineId: "mac_combine" }),
      makeLogReply({ machineId: "mac_heavy" }),
    ];
    expect(lastSeedingMachine(logs)).toBe("mac_heavy");
    expect(lastSeedingMachine([])).toBeNull();
  });
});

describe("the main button", () => {
  it.each([415, 413, 422])("is another file where this one is refused with %s", async (status) => {
    sending.answer.mockRejectedValue(problem(status));
    show();
    await chooseFile();
    await take();
    expect(await screen.findByRole("button", { name: "Choose another file" })).toBeInTheDocument();
    expect(screen.queryByRole("button", { name: "Try again" })).toBeNull();
  });

  it("is another try where the connection was lost", async () => {
    sending.answer.mockRejectedValue(new TypeError("lost"));
    show();
    await chooseFile();
    await take();
    expect(await screen.findByRole("button", { name: "Try again" })).toBeInTheDocument();
  });

  it("opens the first log of a repeat", async () => {
    sending.answer.mockRejectedValue(problem(409, { logId: "log_first" }));
    show();
    await chooseFile();
    await take();
    expect(await screen.findByText("This file is already in this field.")).toBeInTheDocument();
    const [first] = screen.getAllByRole("link");
    expect(first).toHaveTextContent("Open the first one");
    expect(first).toHaveAttribute("href", "/larkspur/fields/fld_1/logs/log_first");
  });
});

describe("leaving while sending", () => {
  it("asks first, and only then", async () => {
    let settle: (accepted: { id: string }) => void = () => undefined;
    sending.answer.mockReturnValue(new Promise((resolve) => (settle = resolve)));
    show();
    await chooseFile();
    expect(asksBeforeLeaving()).toBe(false);
    await take();
    expect(asksBeforeLeaving()).toBe(true);
    settle({ id: "log_1" });
    await vi.waitFor(() => expect(sessionStorage).toHaveLength(0));
  });

  it("is told on return, until another file is chosen", async () => {
    // What a page that was left in the middle of sending leaves behind.
    sessionStorage.setItem("coulterbook-sending-fld_1", "pass.csv");
    show();
    expect(screen.getByRole("alert")).toHaveTextContent("pass.csv was still being sent when this page was left");
    await chooseFile();
    fireEvent.click(screen.getByRole("button", { name: "Choose another file" }));
    expect(screen.queryByRole("alert")).toBeNull();
  });
});
