import { screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import fc from "fast-check";
import { beforeAll, describe, expect, it } from "vitest";
import { LineUpChart } from "@/components/field-book/line-up-chart";
import { lineUpColumns } from "@/components/field-book/line-up-columns";
import { LineUpTable } from "@/components/field-book/line-up-table";
import { OwnUnitChoices } from "@/components/units/own-unit-choices";
import { UnitSwitch } from "@/components/units/unit-switch";
import { displayUnit, OWN_UNITS, type UnitSystem } from "@/lib/units/display-unit";
import { giveElementsSize, renderInBook, STATISTICS } from "@/tests/components/field-book/render-in-book";

beforeAll(() => giveElementsSize(380, 260));

describe("other units", () => {
  it("come at once to an open chart and an open table", async () => {
    const { container } = renderInBook(
      <>
        <UnitSwitch />
        <OwnUnitChoices />
        <LineUpChart statistics={STATISTICS} classes={null} />
        <LineUpTable statistics={STATISTICS} onClose={() => undefined} />
      </>,
    );
    const user = userEvent.setup();
    const axis = () => [...container.querySelectorAll("svg text")].map(({ textContent }) => textContent);
    expect(axis()).toContain("N");
    await user.click(screen.getByRole("radio", { name: "US" }));
    expect(axis()).toContain("lbf");
    expect(screen.getByRole("columnheader", { name: "Median, lbf" })).toBeInTheDocument();
    await user.selectOptions(screen.getByLabelText("Forces"), "kgf");
    expect(axis()).toContain("kgf");
    expect(axis()).not.toContain("lbf");
    expect(screen.getByRole("columnheader", { name: "Median, kgf" })).toBeInTheDocument();
    // Lengths stay with the system: 1450.5 m / 0.3048 = 4758.9 ft (NIST SP 811).
    expect(screen.getByRole("columnheader", { name: "Distance, ft" })).toBeInTheDocument();
  });

  it("leave the same quantity in the file, to the sensor's own precision", () => {
    const units: fc.Arbitrary<UnitSystem> = fc.oneof(
      fc.constantFrom("metric", "imperial"),
      fc.record({
        system: fc.constantFrom("metric", "imperial"),
        own: fc.record({ force: fc.constantFrom(...OWN_UNITS.force) }),
      }),
    );
    fc.assert(
      fc.property(units, fc.double({ min: 1, max: 5000, noNaN: true }), (system, p50) => {
        const items = STATISTICS.items.map((item) => ({ ...item, p50 }));
        const median = lineUpColumns({ ...STATISTICS, items }, system).find(({ id }) => id === "p50")!;
        const { factor, symbol } = displayUnit("N", system);
        expect(median.header).toBe(`Median, ${symbol}`);
        // A reading is kept in single precision: 24 bits.
        expect(Math.abs(Number(median.value(items[0]!)) * factor - p50) / p50).toBeLessThan(5e-7);
      }),
    );
  });
});
