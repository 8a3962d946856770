import { readFileSync } from "node:fs";
import Papa from "papaparse";
import { beforeAll, describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { resolveChannelOrReason } from "@/lib/channels/resolve-channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { SeederInput } from "@/lib/machines/machine";
import { passStatistics } from "@/lib/pass-figures/pass-statistics";
import { rowDistances } from "@/lib/rows/row-distances";
import { rowStatistics } from "@/lib/statistics/row-statistics";
import { readAsProposed, textSource } from "@/tests/lib/ingest/support/make-source";

/**
 * What R 4.2.2 (Debian r-base-core 4.2.2.20221110-2) makes of the same file, by `fixtures/stats/line-up/recompute.R`: it reads
 * the CSV itself, places the rows on the ellipsoid itself, and uses weighted.mean, approx, median and mad.
 */
const FOLDER = "fixtures/stats/line-up";
const FILE = "fixtures/logs/csv/wide-newtons";
const CHANNELS = ["downforce", "margin", "depth"];

/** Positions are rounded to 1e-8 degrees, about a millimetre, and R's metres are those of one latitude. */
const DISTANCE_SHARE = 2e-5;

function readTable(name: string): Record<string, string>[] {
  return Papa.parse<Record<string, string>>(readFileSync(`${FOLDER}/${name}`, "utf8"), {
    header: true,
    skipEmptyLines: true,
  }).data;
}

/** R's NA stands for what the product calls unknown. */
const numberOf = (text: string | undefined) => (text === undefined || text === "NA" ? null : Number(text));

function expectClose(found: number | null, wanted: number | null, what: string): void {
  if (wanted === null) return expect(found, what).toBeNull();
  expect(found, what).not.toBeNull();
  const allowed = Math.max(Math.abs(wanted) * DISTANCE_SHARE, 1e-9);
  expect(Math.abs(found! - wanted), `${what}: ${found} for ${wanted}`).toBeLessThanOrEqual(allowed);
}

let placed: PlacedLog;
beforeAll(async () => {
  const { machine } = JSON.parse(readFileSync(`${FILE}/truth.json`, "utf8")) as { machine: unknown };
  const { log } = await readAsProposed(textSource(readFileSync(`${FILE}/input.csv`, "utf8")));
  const built = buildLog(log, SeederInput.parse(machine));
  if (!built.ok) throw new Error(built.error.message);
  placed = built.value.placed;
});

const FIELDS = [
  ...["n", "distanceM", "mean", "sd", "min", "p05", "p25", "p50", "p75", "p95", "max"],
  ...["shareUnderTarget", "shareAtLimit", "shareContactLost", "longestUnderTargetM"],
] as const;

describe("the line-up, recomputed in R", () => {
  it.each(CHANNELS)("of %s: distance, mean, sd, quantiles, shares, longest run", (channel) => {
    const table = readTable("rows.csv").filter((line) => line.channel === channel);
    const { items } = rowStatistics(placed, channel);
    expect(table).toHaveLength(items.length);
    table.forEach((line, at) => {
      const item = items[at]! as unknown as Record<string, number | null>;
      for (const field of FIELDS) expectClose(item[field]!, numberOf(line[field]), `${channel} row ${at + 1} ${field}`);
    });
  });

  it.each(CHANNELS)("of %s: z of the deviation from the other rows, and who is flagged", (channel) => {
    const table = readTable("rows.csv").filter((line) => line.channel === channel);
    const { items } = rowStatistics(placed, channel);
    table.forEach((line, at) => {
      const wanted = numberOf(line.deviationZ)!;
      // A ratio of small differences of weighted medians.
      expect(Math.abs(items[at]!.deviationZ! - wanted), `row ${at + 1}`).toBeLessThan(
        2e-3 * Math.max(1, Math.abs(wanted)),
      );
    });
    const beyond = table.filter((line) => Math.abs(numberOf(line.deviationZ)!) > 3.5).map((line) => Number(line.row));
    expect(items.filter((item) => item.flagged).every((item) => beyond.includes(item.row))).toBe(true);
    if (channel !== "depth") expect(beyond).toEqual([6]);
  });

  it.each(CHANNELS)("of %s pass by pass", (channel) => {
    const table = readTable("passes.csv").filter((line) => line.channel === channel);
    const resolved = resolveChannelOrReason(placed, channel);
    if (!resolved.ok) throw new Error(resolved.error);
    const { items } = passStatistics({ placed, channel: resolved.value, distances: rowDistances(placed) });
    expect(table).toHaveLength(items.length);
    table.forEach((line, at) => {
      const item = items[at]! as unknown as Record<string, number | null>;
      for (const field of Object.keys(line).filter((name) => name !== "channel")) {
        expectClose(item[field]!, numberOf(line[field]), `${channel} pass ${at + 1} ${field}`);
      }
    });
  });
});
