import { cleanup, render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it } from "vitest";
import { OwnUnitChoices } from "@/components/units/own-unit-choices";
import { Quantity } from "@/components/units/quantity";
import { UnitSwitch } from "@/components/units/unit-switch";
import { UnitsProvider, useUnits } from "@/components/units/use-units";

afterEach(cleanup);

function Exact() {
  return <output>{useUnits().exact(943.02, "N")}</output>;
}

function show() {
  render(
    <UnitsProvider start="imperial" own={{ depth: "cm" }} keep={false}>
      <UnitSwitch />
      <OwnUnitChoices />
      <p data-testid="force">
        <Quantity value={943.02} unit="N" />
      </p>
      <p data-testid="depth">
        <Quantity value={0.0508} unit="m" channel="depth" />
      </p>
      <Exact />
    </UnitsProvider>,
  );
  return userEvent.setup();
}
const text = (id: string) => screen.getByTestId(id).textContent;

describe("units chosen one by one", () => {
  it("are shown at once, beside those of the system", async () => {
    const user = show();
    expect([text("force"), text("depth")]).toEqual(["212\u202flbf", "5.1\u202fcm"]);
    await user.selectOptions(screen.getByLabelText("Forces"), "kgf");
    expect([text("force"), text("depth")]).toEqual(["96.2\u202fkgf", "5.1\u202fcm"]);
    // 943.02 N / 9.80665 (NIST SP 811), to twelve figures.
    expect(screen.getByRole("status").textContent).toBe("96.1612783162");
    await user.click(screen.getByRole("radio", { name: "Metric" }));
    expect([text("force"), text("depth")]).toEqual(["96.2\u202fkgf", "5.1\u202fcm"]);
    await user.selectOptions(screen.getByLabelText("Forces"), "");
    await user.selectOptions(screen.getByLabelText("Depth and row spacing"), "");
    expect([text("force"), text("depth")]).toEqual(["943\u202fN", "51\u202fmm"]);
  });
});
