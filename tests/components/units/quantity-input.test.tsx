import { cleanup, render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import { QuantityInput } from "@/components/units/quantity-input";
import { UnitSwitch } from "@/components/units/unit-switch";
import { UnitsProvider } from "@/components/units/use-units";

afterEach(cleanup);

function show(value: number | undefined) {
  const onChange = vi.fn<(valueSi: number | undefined) => void>();
  render(
    <UnitsProvider start="imperial" keep={false}>
      <UnitSwitch />
      <QuantityInput label="Row spacing" unit="m" channel="rowSpacing" value={value} onChange={onChange} />
    </UnitsProvider>,
  );
  return { onChange, user: userEvent.setup(), box: screen.getByLabelText("Row spacing") };
}

describe("a number with a unit", () => {
  it("is typed in inches and kept in metres", async () => {
    const { onChange, user, box } = show(undefined);
    await user.type(box, "7,5");
    // 7.5 in * 0.0254 m (exact, NIST SP 811)
    expect(onChange.mock.lastCall?.[0]).toBeCloseTo(0.1905, 12);
  });

  it("is said anew in the other units, without change", async () => {
    const { onChange, user, box } = show(0.25);
    expect(box).toHaveValue("9.8425");
    await user.click(screen.getByRole("radio", { name: "Metric" }));
    expect(box).toHaveValue("250");
    expect(onChange).not.toHaveBeenCalled();
  });

  it("does not take a word for a number, nor an empty box for zero", async () => {
    const { onChange, user, box } = show(undefined);
    await user.type(box, "wide");
    expect(onChange.mock.lastCall?.[0]).toBeNaN();
    await user.clear(box);
    expect(onChange.mock.lastCall?.[0]).toBeUndefined();
  });
});
