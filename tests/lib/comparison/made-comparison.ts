import type { LogToCompare } from "@/lib/comparison/log-to-compare";
import type { ChannelOnGround } from "@/lib/pass-figures/pass-readings";
import { createSeededRandom } from "@/lib/simulator/seeded-random";
import type { Seeder } from "@/lib/machines/machine";
import { backAndForth, onGround } from "@/tests/lib/pass-figures/made-log";

export const RECORDS = 41;
export const ROWS = 8;

export function toCompare(from: ChannelOnGround, changes: Partial<LogToCompare> = {}): LogToCompare {
  return {
    from,
    logId: "log_a",
    name: "Day one",
    fieldId: "fld_east",
    startedAt: null,
    harvestAxesDeg: [],
    ...changes,
  };
}

export interface MadeSide {
  passes: number;
  seed: number;
  /** Added to all rows, and to one. */
  allN?: number;
  row?: { row: number; byN: number };
  channel?: "margin" | "downforce";
  machine?: Partial<Seeder>;
  rows?: number;
}

/** Passes there and back; each has ground of its own, each row its own habit, each reading its noise. */
export function madeSide({ passes, seed, allN = 0, row, channel = "margin", machine, rows = ROWS }: MadeSide) {
  const ground = createSeededRandom(seed, "ground");
  const noise = createSeededRandom(seed, "noise");
  const ofPass = Array.from({ length: passes }, () => 30 * ground.normal());
  const value = (record: number, of: number) =>
    450 +
    allN +
    10 * Math.sin(of) +
    ofPass[Math.floor(record / RECORDS)]! +
    40 * noise.normal() +
    (row?.row === of ? row.byN : 0);
  return onGround({ records: backAndForth(passes, RECORDS), rows, channels: [{ id: channel, value }] }, channel, {
    targetMarginN: 450,
    marginDeadbandN: 100,
    ...machine,
  });
}
