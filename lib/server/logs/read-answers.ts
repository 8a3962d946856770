import "server-only";
import { withOrganisation } from "@/db/client";
import { findLogResult, saveLogResult } from "@/db/queries/log-results";
import { z } from "zod";
import { AppError } from "@/lib/errors";
import { isChannelId } from "@/lib/logs/channel";
import { decodeCursor, pageOf } from "@/lib/paging/cursor";
import type { ListQuery } from "@/lib/schemas/listing";
import { CoverageBody, PassBody, RowStatisticsBody, VerdictBody } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { findPlacedLog, getReadLog } from "@/lib/server/logs/find-placed-log";
import { rowStatistics } from "@/lib/statistics/row-statistics";

async function findAnswer(scope: Scope, logId: string, kind: string): Promise<unknown> {
  const { version } = await getReadLog(scope, logId);
  return withOrganisation(scope, (tx) => findLogResult(tx, scope, { logId, version, kind }));
}

/** Passes in order of their numbers, a page at a time. */
export async function listPasses(
  _container: Container,
  scope: Scope,
  input: { logId: string; query: ListQuery },
): Promise<{ items: PassBody[]; nextCursor: string | null }> {
  const { limit, cursor } = input.query;
  const all = z.array(PassBody).parse(await findAnswer(scope, input.logId, "passes"));
  const after = Number(decodeCursor(cursor)?.[0] ?? 0);
  const later = all.filter((pass) => pass.pass > after).slice(0, limit + 1);
  const { rows, nextCursor } = pageOf(later, limit, (pass) => [String(pass.pass), String(pass.pass)]);
  return { items: rows, nextCursor };
}

export async function getCoverage(_container: Container, scope: Scope, logId: string): Promise<CoverageBody> {
  return CoverageBody.parse(await findAnswer(scope, logId, "coverage"));
}

export async function getVerdict(_container: Container, scope: Scope, logId: string): Promise<VerdictBody> {
  return VerdictBody.parse(await findAnswer(scope, logId, "verdict"));
}

/** Statistics of every row in a channel; those of a derived channel are worked out once and kept with the version. */
export async function getRowStatistics(
  _container: Container,
  scope: Scope,
  input: { logId: string; channel: string },
): Promise<RowStatisticsBody> {
  const { logId, channel } = input;
  if (!isChannelId(channel)) {
    const message = `"${channel}" is not the name of a channel`;
    throw new AppError("unprocessable", `${message}.`, { places: [{ path: "channel", message }] });
  }
  const kind = `rows:${channel}`;
  const stored = await findAnswer(scope, logId, kind);
  if (stored) return RowStatisticsBody.parse(stored);
  const { log, placed } = await findPlacedLog(scope, logId, channel);
  const { items, unit } = rowStatistics(placed, channel);
  const body = { channel, unit, items };
  await withOrganisation(scope, (tx) => saveLogResult(tx, scope, { logId, version: log.version, kind, body }));
  return body;
}
