import { describe, expect, it } from "vitest";
import { compareLogs } from "@/lib/comparison/compare-logs";
import { LARKSPUR, LARKSPUR_NEXT_DAY } from "@/lib/simulator/scenario/larkspur";
import type { SimulationInput } from "@/lib/simulator/simulation-options";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { ComparisonBody } from "@/lib/schemas/comparison";
import { placeOnGround } from "@/tests/lib/pass-figures/made-log";
import { madeSide, toCompare } from "./made-comparison";

const before = (passes = 20) => toCompare(madeSide({ passes, seed: 1 }));
const measure = (body: ComparisonBody, name: string) => body.overall.find((one) => one.measure === name)!;

describe("two logs of one machine", () => {
  const after = toCompare(madeSide({ passes: 24, seed: 2, allN: 120, row: { row: 5, byN: 90 } }), {
    logId: "log_b",
    name: "Day two",
  });
  const body = compareLogs(before(), after);

  it("fit what is promised to whoever asks", () => {
    expect(ComparisonBody.parse(body)).toEqual(body);
    expect(body).toMatchObject({
      channel: "margin",
      unit: "N",
      before: { passes: 20 },
      after: { passes: 24, name: "Day two" },
    });
  });

  it("say how much all rows changed, with an interval about it that holds the truth", () => {
    const { difference, interval, told } = measure(body, "mean");
    // One row in eight by 90 N more: 120 + 90 / 8.
    expect(interval![0]).toBeLessThan(131.25);
    expect(interval![1]).toBeGreaterThan(131.25);
    expect(difference).toBeGreaterThan(interval![0]);
    expect(difference).toBeLessThan(interval![1]);
    expect(told).toBe("more");
  });

  it("name the row that changed beyond the others, and no other", () => {
    expect(body.rows.filter((row) => row.told !== "cannot-tell").map((row) => [row.row, row.told])).toEqual([
      [5, "more"],
    ]);
    expect(body.rows[4]!.beyondOthers).toBeCloseTo(90, -1);
  });

  it("agree with the plain arithmetic of the readings (hand-worked)", () => {
    const weighed = (from: typeof after.from) => {
      let [sum, squares, weight] = [0, 0, 0];
      const { channel, distances, placed } = from;
      channel.values.forEach((value, k) => {
        if (placed.passOf[Math.floor(k / channel.rows)] === 0) return;
        sum += value * distances[k]!;
        squares += value * value * distances[k]!;
        weight += distances[k]!;
      });
      return { mean: sum / weight, spread: Math.sqrt(squares / weight - (sum / weight) ** 2) };
    };
    const [a, b] = [weighed(before().from), weighed(after.from)];
    expect(measure(body, "mean").difference).toBeCloseTo(b.mean - a.mean, 6);
    expect(measure(body, "spread").before).toBeCloseTo(a.spread, 4);
    expect(measure(body, "spread").after).toBeCloseTo(b.spread, 4);
  });

  it("share the distance out over the same classes, all of it", () => {
    const { edges, before: first, after: second } = body.distribution;
    expect(edges.length).toBe(first.length + 1);
    for (const shares of [first, second]) expect(shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(1, 9);
    const middle = (shares: number[]) =>
      shares.reduce((sum, share, k) => sum + share * (edges[k]! + edges[k + 1]!) * 0.5, 0);
    expect(middle(second) - middle(first)).toBeCloseTo(131, -1);
  });
});

describe("what a comparison cannot tell", () => {
  it("is any difference from fewer than eight passes, and it says so", () => {
    const body = compareLogs(before(6), toCompare(madeSide({ passes: 20, seed: 3, allN: 300 }), { name: "Day two" }));
    expect(measure(body, "mean").difference).toBeGreaterThan(200);
    expect(measure(body, "mean")).toMatchObject({ interval: null, told: "cannot-tell" });
    expect(body.rows.every((row) => row.interval === null && row.told === "cannot-tell")).toBe(true);
    expect(body.reasons[0]).toMatch(
      /^An interval of all rows together needs 8 passes on either side; Day one has 6\.$/,
    );
  });

  it("is a row where the drill ran along the harvest passes", () => {
    const after = toCompare(madeSide({ passes: 20, seed: 4, row: { row: 5, byN: 200 } }), { harvestAxesDeg: [178] });
    const body = compareLogs(before(), after);
    expect(body.rows[4]!.beyondInterval![0]).toBeGreaterThan(100);
    expect(body.rows[4]!.told).toBe("cannot-tell");
    expect(body.reasons).toEqual([expect.stringMatching(/^Day one was driven along the harvest passes \(2° apart\)/)]);
    // Twenty degrees across is enough.
    expect(compareLogs(before(), { ...after, harvestAxesDeg: [20] }).rows[4]!.told).toBe("more");
  });

  it("is a row where all passes of a log went one way", () => {
    const { from } = before();
    const passes = from.placed.passes.filter((pass) => Math.abs(pass.headingDeg) < 90 || pass.headingDeg > 270);
    const oneWay = toCompare({ ...from, placed: { ...from.placed, passes } });
    const body = compareLogs(oneWay, toCompare(madeSide({ passes: 20, seed: 5, row: { row: 2, byN: -200 } })));
    expect(body.rows[1]!.told).toBe("cannot-tell");
    expect(body.reasons).toEqual([expect.stringMatching(/^Day one was driven one way only/)]);
  });

  it("is rows of machines with other numbers of them", () => {
    const body = compareLogs(before(), toCompare(madeSide({ passes: 20, seed: 6, rows: 6 })));
    expect(body.rows).toEqual([]);
    expect(body.reasons).toEqual(["One log has 8 rows and the other 6: rows cannot be paired."]);
    expect(body.cautions).toContain("The two logs come from machines with other rows.");
    expect(measure(body, "mean").interval).not.toBeNull();
  });

  it("is hidden by other targets, which are named", () => {
    const body = compareLogs(before(), toCompare(madeSide({ passes: 20, seed: 7, machine: { targetMarginN: 700 } })));
    expect(body.cautions).toContain(
      "The machines had other target margins: shares under target are each by their own.",
    );
    expect(measure(body, "share-under-target").told).toBe("more");
  });
});

describe("East quarter and the day after, with opener 17 renewed and more ballast", () => {
  const place = (input: SimulationInput, channel: string) =>
    placeOnGround(simulateSeedingLog(input).log, input.machine!, channel);
  const first = LARKSPUR.fields[0]!.seeding.input;

  it("shows row 17 and no other, on other ground", () => {
    const body = compareLogs(
      toCompare(place(first, "margin"), { harvestAxesDeg: [0] }),
      toCompare(place(LARKSPUR_NEXT_DAY.input, "margin"), { harvestAxesDeg: [0] }),
    );
    // Passes get shorter towards the corner, and a start ramp weighs the more: neighbours are alike, all rows together cannot be told.
    expect(body.reasons).toEqual([
      expect.stringMatching(/^An interval of all rows together .* in Day one \d+ neighbouring passes are so alike/),
    ]);
    expect(body.overall.every((one) => one.told === "cannot-tell")).toBe(true);
    expect(body.rows.filter(({ told }) => told === "more" || told === "less").map(({ row }) => row)).toEqual([17]);
    // Every row has a zero of its own in each log, a few newtons: seen, and too small to speak of.
    expect(body.rows.filter(({ told }) => told === "too-small").length).toBeGreaterThan(0);
    // The simulator took 150 N off row 17's margin on the first day.
    expect(body.rows[16]!.beyondInterval![0]).toBeLessThan(150);
    expect(body.rows[16]!.beyondInterval![1]).toBeGreaterThan(120);
  });
});
