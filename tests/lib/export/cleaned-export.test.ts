import { describe, expect, it } from "vitest";
import { adjustLog } from "@/lib/adjustments/adjust-log";
import { adjustPart } from "@/lib/adjustments/adjust-part";
import { noAdjustments, type Adjustments } from "@/lib/adjustments/adjustments";
import { readingsBatches, readingsTable } from "@/lib/export/columns/readings-table";
import { wideReadingsTable } from "@/lib/export/columns/wide-readings-table";
import { logParts, outlineOf } from "@/lib/export/log-parts";
import { readmeText } from "@/lib/export/readme-text";
import { aboutOf, cellsOf, mustBuild } from "@/tests/lib/export/make-export";
import { createFixtureLog } from "@/tests/support/fixture-logs";

const { log, truth } = createFixtureLog();
const placed = mustBuild(log, truth.options.machine);

function withRules(): Adjustments {
  const { delaysS, cleaning } = noAdjustments();
  const ramp = { ...cleaning["start-ramp"], on: true, distanceM: 12, timeS: 0 };
  // 4.1 mph as a person types it, in m/s.
  const slow = { ...cleaning.speed, on: false, minMps: 1.8328639999999998 };
  return { delaysS, cleaning: { ...cleaning, "start-ramp": ramp, speed: slow } };
}

function cleanedReadings(shape: "long" | "wide") {
  const adjustments = withRules();
  const { cleaned } = adjustLog(placed, adjustments);
  const outline = { ...outlineOf(placed), leftOut: cleaned! };
  const table = shape === "wide" ? wideReadingsTable(outline) : readingsTable(outline);
  const parts = [...logParts(placed)].map((part) => adjustPart(part, { ...adjustments, leftOut: cleaned }));
  const batches = parts.flatMap((part) => [...readingsBatches(table, part)]);
  const cells = (name: string) => cellsOf(table, batches, name);
  return { table, outline, cells };
}

describe("an export with cleaning rules", () => {
  it.each(["long", "wide"] as const)("names the fixed rule where a record stands in no pass (%s)", (shape) => {
    const { cells } = cleanedReadings(shape);
    const [reasons, passes, flags] = [cells("leftOut"), cells("pass"), cells("flags")];
    const margins = cells(shape === "wide" ? "marginN_1" : "marginN");
    let [outside, kept, ramps] = [0, 0, 0];
    reasons.forEach((reason, at) => {
      if (passes[at] === 0 && String(flags[at] ?? "").includes("not-working")) {
        expect(reason).toBe("not-working");
        outside++;
        if (Number.isFinite(margins[at])) kept++;
      }
      if (passes[at] !== 0) expect([null, "start-ramp"]).toContain(reason);
      if (reason === "start-ramp") {
        expect(passes[at]).toBeGreaterThan(0);
        expect(margins[at]).toBeNaN();
        ramps++;
      }
    });
    expect(outside).toBeGreaterThan(10);
    expect(kept).toBeGreaterThan(10);
    expect(ramps).toBeGreaterThan(10);
  });

  it("says so beside the file: what stands in no pass keeps its readings and counts nowhere", () => {
    const { table, outline } = cleanedReadings("long");
    const about = aboutOf({ table, outline, shape: "long", readAgain: null });
    const { cleaning } = withRules();
    const adjustments = {
      revision: 3,
      delaysS: { margin: 0.30000000000000004 },
      cleaning: { ...cleaning, speed: { ...cleaning.speed, on: true } },
    };
    const text = readmeText({ ...about, adjustments }, { names: "long", metadataName: "metadata.json" });
    const words = text.replaceAll(/\s+/g, " ");
    expect(words).toContain("Records in no pass (pass = 0: not working");
    expect(words).toContain("take only records with pass > 0");
    expect(words).toContain(
      "it names the rule that keeps it out of passes (no-position, impossible-step, not-working)",
    );
    expect(words).toMatch(/not-working: Not working\. Always on: keeps records .* out of every pass/);
    expect(words).not.toMatch(/not-working[^.]*\. Leaves out/);
    // Six digits that count: no tails of a unit's conversion.
    expect(words).toContain("minMps 1.83286,");
    expect(words).toContain("Delay of margin: 0.3 s.");
    expect(words).not.toMatch(/\d\.\d{9}/);
  });
});
