import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { MachineForm } from "@/components/machines/machine-form";
import { UnitsProvider, type UnitSystemName } from "@/components/units/use-units";

vi.mock("next/navigation", () => ({ useRouter: () => ({ push: vi.fn() }) }));

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function show(units: UnitSystemName = "imperial") {
  const sent: unknown[] = [];
  vi.stubGlobal("fetch", (_path: string, init: RequestInit) => {
    sent.push(JSON.parse(String(init.body)));
    const stored = {
      id: "mac_larkspur00001",
      createdAt: "2031-09-01T00:00:00.000Z",
      updatedAt: "2031-09-01T00:00:00.000Z",
    };
    return Promise.resolve(new Response(JSON.stringify({ ...(sent.at(-1) as object), ...stored }), { status: 201 }));
  });
  render(
    <QueryClientProvider client={new QueryClient()}>
      <UnitsProvider start={units} keep={false}>
        <MachineForm
          slug="larkspur-flats"
          machineId={null}
          start={{ kind: "seeder", name: "", hitch: "rigid", antennaRightM: 0 }}
        />
      </UnitsProvider>
    </QueryClientProvider>,
  );
  return { sent, user: userEvent.setup() };
}

describe("describing a drill", () => {
  it("says beside each answer what is missing, and sends nothing", async () => {
    const { sent, user } = show();
    await user.click(screen.getByRole("button", { name: "Save the machine" }));
    expect(await screen.findByText("Give the machine a name.")).toBeInTheDocument();
    expect(screen.getByLabelText("Row spacing")).toHaveAccessibleDescription(/Needed\./);
    expect(sent).toEqual([]);
  });

  it("sends metres and kilograms for what was typed in inches, feet and pounds", async () => {
    const { sent, user } = show();
    await user.type(screen.getByLabelText("Name"), "24-row drill");
    await user.type(screen.getByLabelText("Rows"), "24");
    await user.type(screen.getByLabelText("Row spacing"), "10");
    await user.type(screen.getByLabelText("Antenna to rows"), "10");
    await user.type(screen.getByLabelText("Mass of one row unit"), "100");
    await user.click(screen.getByRole("button", { name: "Save the machine" }));
    await waitFor(() => expect(sent).toHaveLength(1));
    const machine = sent[0] as Record<string, number>;
    // Exact factors of NIST SP 811: inch 0.0254 m, foot 0.3048 m, pound 0.45359237 kg.
    expect(machine.rowSpacingM).toBeCloseTo(0.254, 12);
    expect(machine.antennaToRowsM).toBeCloseTo(3.048, 12);
    expect(machine.rowUnitMassKg).toBeCloseTo(45.359237, 9);
    expect(machine.rowCount).toBe(24);
  });

  it("takes rows of sections and wings, and says where they do not add up", async () => {
    const { sent, user } = show("metric");
    await user.type(screen.getByLabelText("Name"), "24-row drill");
    await user.type(screen.getByLabelText("Rows"), "24");
    await user.type(screen.getByLabelText("Row spacing"), "250");
    await user.type(screen.getByLabelText("Antenna to rows"), "4");
    await user.type(screen.getByLabelText("Mass of one row unit"), "80");
    await user.type(screen.getByLabelText("Rows in each section"), "6 6 6 6");
    await user.type(screen.getByLabelText("Rows on each wing and the centre"), "8, 8, 7");
    await user.click(screen.getByRole("button", { name: "Save the machine" }));
    expect(await screen.findByText("add up to 23 rows, not 24")).toBeInTheDocument();
    expect(sent).toEqual([]);
    await user.clear(screen.getByLabelText("Rows on each wing and the centre"));
    await user.type(screen.getByLabelText("Rows on each wing and the centre"), "8 8 8");
    await user.click(screen.getByRole("button", { name: "Save the machine" }));
    await waitFor(() => expect(sent).toHaveLength(1));
    expect(sent[0]).toMatchObject({ sections: [6, 6, 6, 6], wings: [8, 8, 8] });
  });

  it("asks again where rows are closer or the machine is wider than any, and takes a decimal comma", async () => {
    const { sent, user } = show("metric");
    await user.type(screen.getByLabelText("Name"), "4-row drill");
    await user.type(screen.getByLabelText("Rows"), "4");
    await user.type(screen.getByLabelText("Row spacing"), "0,75");
    await user.type(screen.getByLabelText("Antenna to rows"), "3,5");
    await user.type(screen.getByLabelText("Mass of one row unit"), "45");
    const save = screen.getByRole("button", { name: "Save the machine" });
    await user.click(save);
    expect(await screen.findByText(/asked in millimetres. Did you mean 750\?/)).toBeInTheDocument();
    await user.clear(screen.getByLabelText("Row spacing"));
    await user.type(screen.getByLabelText("Row spacing"), "4000");
    await user.clear(screen.getByLabelText("Rows"));
    await user.type(screen.getByLabelText("Rows"), "40");
    await user.click(save);
    expect(await screen.findByText(/wider than any seeder/)).toBeInTheDocument();
    expect(sent).toEqual([]);
    await user.clear(screen.getByLabelText("Row spacing"));
    await user.type(screen.getByLabelText("Row spacing"), "750,0");
    await user.click(save);
    await waitFor(() => expect(sent).toHaveLength(1));
    expect(sent[0]).toMatchObject({ rowSpacingM: 0.75, antennaToRowsM: 3.5 });
  });
});

describe("a machine that a role may only look at", () => {
  it("is shown with its numbers, none of which can be changed", () => {
    const start = { kind: "seeder", name: "24-row drill", hitch: "rigid", rowCount: 24, rowSpacingM: 0.25 } as const;
    render(
      <QueryClientProvider client={new QueryClient()}>
        <UnitsProvider start="metric" keep={false}>
          <MachineForm slug="larkspur-flats" machineId="mac_1" start={start} mayWrite={false} />
        </UnitsProvider>
      </QueryClientProvider>,
    );
    expect(screen.getByLabelText("Row spacing")).toHaveValue("250");
    for (const field of screen.getAllByRole("textbox")) expect(field).toBeDisabled();
    expect(screen.queryByRole("button", { name: "Save the machine" })).not.toBeInTheDocument();
    expect(screen.getByText(/Your role may look at this machine/)).toBeInTheDocument();
  });
});
