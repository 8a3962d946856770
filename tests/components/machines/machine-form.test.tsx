import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { MachineForm } from "@/components/machines/machine-form";
import { UnitsProvider } from "@/components/units/use-units";

vi.mock("next/navigation", () => ({ useRouter: () => ({ push: vi.fn() }) }));

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function show() {
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
      <UnitsProvider start="imperial" keep={false}>
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
});
