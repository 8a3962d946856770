import { buildLog } from "@/lib/build/build-log";
import { resolveChannel } from "@/lib/channels/resolve-channel";
import { measureCoverage } from "@/lib/coverage/measure-coverage";
import { passVerdict } from "@/lib/findings/pass-verdict";
import type { ReadLog } from "@/lib/ingest/log-format";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { Seeder } from "@/lib/machines/machine";
import { rowDistances } from "@/lib/rows/row-distances";
import type { Boundary } from "@/lib/schemas/geometry";
import type { BuiltPackage } from "@/lib/server/logs/built-package";
import { describePassBodies, describePlacedLog } from "@/lib/server/logs/describe-placed-log";
import { LogFailure } from "@/lib/server/logs/log-failure";
import { rowStatistics } from "@/lib/statistics/row-statistics";

/** Said while the work goes on; `progress` is the share of the whole log that is done. */
export type TellProgress = (stage: string, progress: number) => void;

/** From records to everything that is stored: placed, described, and the answers worked out once. */
export function buildPackage(
  read: ReadLog,
  options: { machine: Seeder | null; boundary: Boundary | null; tell: TellProgress },
): BuiltPackage {
  const { machine, boundary, tell } = options;
  tell("Placing every row on the ground", 0.5);
  const built = buildLog(read.log, machine, { boundary });
  if (!built.ok) throw new LogFailure({ code: built.error.code, message: built.error.message });
  const { placed } = built.value;
  const notes = [...read.notes, ...built.value.notes];
  const results = buildResults(placed, boundary, tell);
  const { plane, ...rest } = placed;
  const planeCentre = { longitude: plane.longitude, latitude: plane.latitude };
  return { placed: { ...rest, planeCentre }, notes, summary: describePlacedLog(placed, notes), results };
}

/** Logged channels of a log, and opener resistance where it can be had. */
export function describedChannels(placed: PlacedLog): string[] {
  const logged = placed.log.channels.map((channel) => channel.id as string);
  return resolveChannel(placed, "resistance") ? [...logged, "resistance"] : logged;
}

function buildResults(placed: PlacedLog, boundary: Boundary | null, tell: TellProgress): BuiltPackage["results"] {
  const distances = rowDistances(placed);
  const results: BuiltPackage["results"] = [{ kind: "passes", body: describePassBodies(placed) }];
  const channels = describedChannels(placed);
  channels.forEach((channel, order) => {
    tell("Working out what each row did", 0.55 + (0.2 * order) / channels.length);
    const { items, unit } = rowStatistics(placed, channel, { distances });
    results.push({ kind: `rows:${channel}`, body: { channel, unit, items } });
  });
  tell("Measuring the ground covered", 0.76);
  results.push({ kind: "coverage", body: measureCoverage(placed, { distances, boundary }) });
  tell("Saying what stands out", 0.8);
  // The verdict crosses into JSON: its numbers are finite or null by its own schema.
  results.push({ kind: "verdict", body: passVerdict(placed, { distances }) });
  return results;
}
