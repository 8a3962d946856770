import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, it, vi } from "vitest";
import { MachineFromLog } from "@/components/machines/machine-from-log";
import { UnitsProvider } from "@/components/units/use-units";
import { makeFound } from "@/tests/components/columns/make-columns";
import { makeLogReply } from "@/tests/components/upload/make-log-reply";

const push = vi.fn();
vi.mock("next/navigation", () => ({ useRouter: () => ({ push }) }));

afterEach(() => {
  cleanup();
  push.mockReset();
  vi.unstubAllGlobals();
});

const device = {
  name: "Larkspur drill",
  rows: 3,
  rowSpacingM: 0.254,
  widthM: 0.762,
  rowOffsetsM: [-0.254, 0, 0.254],
  rowForwardM: [0, 0, 0],
  rowWidthsM: [0.254, 0.254, 0.254],
  rowsBehindReferenceM: null,
};
const stored = { id: "mac_made1", createdAt: "2026-12-01T12:00:00Z", updatedAt: "2026-12-01T12:00:00Z" };

function show(found = { ...makeFound(), device }) {
  const sent: Record<string, unknown>[] = [];
  const json = (body: unknown, status = 200) => Promise.resolve(new Response(JSON.stringify(body), { status }));
  vi.stubGlobal("fetch", (path: string, init?: RequestInit) => {
    if (init?.method === "POST") {
      sent.push(JSON.parse(String(init.body)) as Record<string, unknown>);
      return json({ ...sent[0], ...stored }, 201);
    }
    return json(path.endsWith("/columns") ? found : makeLogReply({ id: "log_1" }));
  });
  render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <UnitsProvider start="imperial" keep={false}>
        <MachineFromLog slug="larkspur-flats" logId="log_1" layer={null} />
      </UnitsProvider>
    </QueryClientProvider>,
  );
  return { sent, user: userEvent.setup() };
}

it("begins with the rows of the file in the person's units, and goes back to the log with the machine made", async () => {
  const { sent, user } = show();
  expect(await screen.findByLabelText("Name")).toHaveValue("Larkspur drill");
  expect(screen.getByLabelText("Rows")).toHaveValue("3");
  // 0.254 m is 10 in exactly (NIST SP 811).
  expect(screen.getByLabelText("Row spacing")).toHaveValue("10");
  expect(screen.getByLabelText("Antenna to rows")).toHaveValue("");
  await user.type(screen.getByLabelText("Antenna to rows"), "10");
  await user.type(screen.getByLabelText("Mass of one row unit"), "100");
  await user.click(screen.getByRole("button", { name: "Save the machine" }));
  await waitFor(() => expect(push).toHaveBeenCalled());
  expect(sent[0]).toMatchObject({ kind: "seeder", rowCount: 3, rowSpacingM: 0.254 });
  expect(push).toHaveBeenCalledWith("/larkspur-flats/fields/fld_eastquarter1/logs/log_1/columns?machine=mac_made1");
});

it("says where the file describes no machine", async () => {
  show(makeFound() as Parameters<typeof show>[0]);
  expect(await screen.findByText("This file does not describe its machine.")).toBeInTheDocument();
});
