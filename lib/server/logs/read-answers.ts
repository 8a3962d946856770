import "server-only";
import { withOrganisation } from "@/db/client";
import { saveLogResult } from "@/db/queries/log-results";
import { z } from "zod";
import { AppError } from "@/lib/errors";
import { isChannelId } from "@/lib/logs/channel";
import { decodeCursor, pageOf } from "@/lib/paging/cursor";
import type { ListQuery } from "@/lib/schemas/listing";
import { CoverageBody, PassBody, RowStatisticsBody, VerdictBody } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import { loadAdjustedLog } from "@/lib/server/adjustments/load-adjusted-log";
import { readLeftOutShare } from "@/lib/server/adjustments/read-cleaning";
import { answerKind, findAnswer, readAdjustedAnswer } from "@/lib/server/adjustments/read-adjusted-answer";
import type { Container } from "@/lib/server/create-container";
import { readSteadily, type LogChoice } from "@/lib/server/logs/find-placed-log";
import { rowStatistics } from "@/lib/statistics/row-statistics";
import { rowStatisticsBody } from "@/lib/statistics/row-statistics-body";

/** An answer that no adjustment changes. */
async function findPlacedAnswer<Body>(
  scope: Scope,
  { logId, kind, schema }: { logId: string; kind: string; schema: z.ZodType<Body> },
): Promise<Body> {
  return readSteadily(scope, { logId, cleaned: false }, async (log) => schema.parse(await findAnswer(log, kind)));
}

/** Passes in order of their numbers, a page at a time. */
export async function listPasses(
  _container: Container,
  scope: Scope,
  input: { logId: string; query: ListQuery },
): Promise<{ items: PassBody[]; nextCursor: string | null }> {
  const { limit, cursor } = input.query;
  const all = await findPlacedAnswer(scope, { logId: input.logId, kind: "passes", schema: z.array(PassBody) });
  const after = Number(decodeCursor(cursor)?.[0] ?? 0);
  const later = all.filter((pass) => pass.pass > after).slice(0, limit + 1);
  const { rows, nextCursor } = pageOf(later, limit, (pass) => [String(pass.pass), String(pass.pass)]);
  return { items: rows, nextCursor };
}

export async function getCoverage(_container: Container, scope: Scope, logId: string): Promise<CoverageBody> {
  return findPlacedAnswer(scope, { logId, kind: "coverage", schema: CoverageBody });
}

export async function getVerdict(container: Container, scope: Scope, input: LogChoice): Promise<VerdictBody> {
  return readSteadily(scope, input, async (log) => {
    const verdict = VerdictBody.parse(await readAdjustedAnswer(container, log, "verdict"));
    return { ...verdict, leftOutShare: await readLeftOutShare(container, log) };
  });
}

/** Statistics of every row in a channel; those of a derived channel are worked out once and kept with the version. */
export async function getRowStatistics(
  container: Container,
  scope: Scope,
  input: LogChoice & { channel: string },
): Promise<RowStatisticsBody> {
  const { channel } = input;
  if (!isChannelId(channel)) {
    const message = `"${channel}" is not the name of a channel`;
    throw new AppError("unprocessable", `${message}.`, { places: [{ path: "channel", message }] });
  }
  const kind = `rows:${channel}`;
  return readSteadily(scope, input, async (log) => {
    const stored = await readAdjustedAnswer(container, log, kind);
    if (stored) return RowStatisticsBody.parse(stored);
    const placed = await loadAdjustedLog(container, log, channel);
    const body = rowStatisticsBody(rowStatistics(placed, channel));
    const key = { logId: log.id, version: log.version, kind: answerKind(log, kind) };
    await withOrganisation(scope, (tx) => saveLogResult(tx, scope, { ...key, body }));
    return body;
  });
}
