import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { sayFinding } from "@/lib/findings/say-finding";
import { fromSi, toSi } from "@/lib/units/convert-unit";
import { displayUnit, OWN_UNITS, systemName, type OwnUnits, type UnitSystem } from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

const THIN = "\u202f";
const NOTHING = undefined;

const ownUnits: fc.Arbitrary<OwnUnits> = fc.record(
  {
    force: fc.constantFrom(...OWN_UNITS.force),
    depth: fc.constantFrom(...OWN_UNITS.depth),
    area: fc.constantFrom(...OWN_UNITS.area),
    speed: fc.constantFrom(...OWN_UNITS.speed),
  },
  { requiredKeys: [] },
);
const unitSystems: fc.Arbitrary<UnitSystem> = fc.oneof(
  fc.constantFrom("metric", "imperial"),
  fc.record({ system: fc.constantFrom("metric", "imperial"), own: ownUnits }),
);
/** What a screen shows, kept in SI: unit and, where it decides, channel. */
const shownThings = fc.constantFrom(
  ["N", NOTHING],
  ["m", NOTHING],
  ["m", "depth"],
  ["m", "rowSpacing"],
  ["m2", NOTHING],
  ["m/s", NOTHING],
  ["Pa", NOTHING],
  ["kg/m2", NOTHING],
) satisfies fc.Arbitrary<readonly [string, string | undefined]>;
/** Nothing that is measured is smaller than a millionth and not nothing. */
const sizes = fc
  .double({ min: -1e6, max: 1e6, noNaN: true, noDefaultInfinity: true })
  .filter((size) => size === 0 || Math.abs(size) > 1e-6);

/** The number of a text as `formatQuantity` writes it. */
function readBack(text: string, symbol: string): number {
  const bare = text.slice(0, text.length - symbol.length).replaceAll(THIN, "");
  return Number(bare.replace("\u2212", "-"));
}

describe("units chosen one by one", () => {
  const mixed: UnitSystem = { system: "imperial", own: { force: "N", depth: "cm", speed: "m/s", area: "ha" } };
  it.each([
    // Factors: NIST SP 811 Appendix B.8. 1 kgf is 9.80665 N; 1 lbf 4.4482216152605 N.
    [943.02, "N", mixed, NOTHING, `943${THIN}N`],
    [943.02, "N", { system: "metric", own: { force: "kgf" } }, NOTHING, `96.2${THIN}kgf`],
    [943.02, "N", { system: "metric", own: { force: "lbf" } }, NOTHING, `212${THIN}lbf`],
    [0.0508, "m", mixed, "depth", `5.1${THIN}cm`],
    [0.25, "m", mixed, "rowSpacing", `25.0${THIN}cm`],
    [30.48, "m", mixed, NOTHING, `100${THIN}ft`],
    [2.3611, "m/s", mixed, NOTHING, `2.36${THIN}m/s`],
    [40_468.564224, "m2", mixed, NOTHING, `4.05${THIN}ha`],
    // A pressure stays a pressure, whatever forces are shown in.
    [689_475.729, "Pa", { system: "imperial", own: { force: "kgf" } }, NOTHING, `100${THIN}psi`],
  ] as const)("says %d %s in %j", (value, unit, units, channel, text) => {
    expect(formatQuantity(value, unit, units, { channel }).text).toBe(text);
  });

  it("leaves everything else as the system has it", () => {
    fc.assert(
      fc.property(fc.constantFrom("metric" as const, "imperial" as const), shownThings, (system, [unit, channel]) => {
        expect(displayUnit(unit, { system, own: {} }, channel)).toEqual(displayUnit(unit, system, channel));
        expect(systemName({ system, own: { force: "kgf" } })).toBe(system);
      }),
    );
  });

  it("comes back to the same SI value, to fifteen figures", () => {
    fc.assert(
      fc.property(unitSystems, shownThings, sizes, (units, [unit, channel], valueSi) => {
        const { factor } = displayUnit(unit, units, channel);
        expect(Math.abs((valueSi / factor) * factor - valueSi)).toBeLessThanOrEqual(4e-16 * Math.abs(valueSi));
      }),
    );
    fc.assert(
      fc.property(fc.constantFrom("lbf", "kgf", "N"), fc.constantFrom("lbf", "kgf", "N"), sizes, (from, to, value) => {
        const back = fromSi(toSi(fromSi(toSi(value, from), to), to), from);
        expect(Math.abs(back - value)).toBeLessThanOrEqual(1e-15 * Math.abs(value) * 2);
      }),
    );
  });

  it("is rounded on a screen by no more than half of its last figure", () => {
    fc.assert(
      fc.property(unitSystems, shownThings, sizes, (units, [unit, channel], valueSi) => {
        const shown = displayUnit(unit, units, channel);
        const { text } = formatQuantity(valueSi, unit, units, { channel });
        const said = readBack(text, shown.symbol);
        const lastFigure = 10 ** -shown.decimals;
        expect(Math.abs(said - valueSi / shown.factor)).toBeLessThanOrEqual(0.5 * lastFigure * (1 + 1e-6));
      }),
    );
  });
});

describe("a verdict in any units", () => {
  const finding = (marginN: number, runM: number, speedMps: number) => ({
    sentenceTemplate: "Row 7 ran under {target} for {run} of its way, at {speed} and {share} of the distance.",
    values: {
      target: { value: marginN, unit: "N" },
      run: { value: runM, unit: "m" },
      speed: { value: speedMps, unit: "m/s" },
      share: { value: 0.31, unit: "fraction" },
    },
  });
  const withoutQuantities = (text: string) =>
    text.replaceAll(/[\u22120-9.\u202f]+(?:N|lbf|kgf|m\/s|m|ft|km\/h|mph)(?=\W)/g, "#");

  it("says the same sentence about the same quantities", () => {
    const magnitudes = fc.tuple(
      fc.double({ min: 20, max: 5000, noNaN: true }),
      fc.double({ min: 10, max: 900, noNaN: true }),
      fc.double({ min: 0.5, max: 5, noNaN: true }),
    );
    fc.assert(
      fc.property(unitSystems, unitSystems, magnitudes, (one, other, [forceN, runM, speedMps]) => {
        const [first, second] = [one, other].map((units) => sayFinding(finding(forceN, runM, speedMps), units));
        expect(withoutQuantities(first!)).toBe(withoutQuantities(second!));
        expect(withoutQuantities(first!)).toContain("under # for # of its way, at # and");
      }),
    );
  });
});
