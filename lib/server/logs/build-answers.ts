import { buildLog, type BuiltLog } from "@/lib/build/build-log";
import { resolveChannel, type ResolvedChannel } from "@/lib/channels/resolve-channel";
import { measureCoverage } from "@/lib/coverage/measure-coverage";
import { passVerdict } from "@/lib/findings/pass-verdict";
import type { ReadLog } from "@/lib/ingest/log-format";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { Seeder } from "@/lib/machines/machine";
import { noteDevice } from "@/lib/machines/note-device";
import { rowDistances } from "@/lib/rows/row-distances";
import type { Boundary } from "@/lib/schemas/geometry";
import type { BuiltAnswers } from "@/lib/server/logs/built-answers";
import { describePassBodies, describePlacedLog } from "@/lib/server/logs/describe-placed-log";
import { LogFailure } from "@/lib/server/logs/log-failure";
import { describeRows, type RowStatistics } from "@/lib/statistics/row-statistics";
import { rowStatisticsBody } from "@/lib/statistics/row-statistics-body";

/** Said while the work goes on; `progress` is the share of the whole log that is done. */
export type TellProgress = (stage: string, progress: number) => void;

/** Puts the records on the ground, with every note so far. @throws LogFailure where they cannot be placed */
export function placeLog(
  read: ReadLog,
  machine: Seeder | null,
  options: { boundary: Boundary | null; workingWidthM: number | null },
): BuiltLog {
  const built = buildLog(read.log, machine, options);
  if (!built.ok) throw new LogFailure({ code: built.error.code, message: built.error.message });
  const device = noteDevice(read.device, machine);
  return { placed: built.value.placed, notes: [...read.notes, ...device, ...built.value.notes] };
}

/** Logged channels of a log, and opener resistance where it can be had. */
function describedChannels(placed: PlacedLog): ResolvedChannel[] {
  const ids = [...placed.log.channels.map((channel) => channel.id), "resistance"];
  return ids.map((id) => resolveChannel(placed, id)).filter((channel) => channel !== null);
}

/** The answers that are stored with a version: passes, rows of every channel, coverage, verdict. */
export function buildAnswers(
  { placed, notes }: BuiltLog,
  options: { boundary: Boundary | null; tell: TellProgress },
): BuiltAnswers {
  const { boundary, tell } = options;
  const distances = rowDistances(placed);
  const results: BuiltAnswers["results"] = [{ kind: "passes", body: describePassBodies(placed) }];
  const channels = describedChannels(placed);
  const statistics = new Map<string, RowStatistics>();
  channels.forEach((channel, order) => {
    tell("Working out what each row did", 0.55 + (0.2 * order) / channels.length);
    const known = describeRows(placed, channel, distances);
    statistics.set(channel.id, known);
    results.push({ kind: `rows:${channel.id}`, body: rowStatisticsBody(known) });
  });
  tell("Measuring the ground covered", 0.76);
  results.push({ kind: "coverage", body: measureCoverage(placed, { distances, boundary }) });
  tell("Saying what stands out", 0.8);
  results.push({ kind: "verdict", body: passVerdict(placed, { distances, statistics }) });
  const resistance = channels.find((channel) => channel.id === "resistance") ?? null;
  return { notes, summary: describePlacedLog(placed, notes, resistance), results };
}
