import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import { findLogResult, saveLogResult } from "@/db/queries/log-results";
import { getLogOrThrow, type LogRow } from "@/db/queries/logs";
import { delayChannels, mainDelayChannels } from "@/lib/alignment/delay-channels";
import { UNKNOWN_DELAY } from "@/lib/alignment/estimate-delay";
import { AppError } from "@/lib/errors";
import type { ChannelDelay, DelaysBody, DelaysChange } from "@/lib/schemas/alignment";
import type { Scope } from "@/lib/scope";
import { findRevision, reviseAdjustments } from "@/lib/server/adjustments/revise-adjustments";
import { delayKind, LOOK, Look, StoredDelay } from "@/lib/server/alignment/stored-look";
import type { Container } from "@/lib/server/create-container";
import { getLogForChange } from "@/lib/server/logs/change-log";

/** What is known of a log's delays. @throws AppError `not_found`, `conflict` before the first version */
export async function readDelays(_container: Container, scope: Scope, logId: string): Promise<DelaysBody> {
  return withOrganisation(scope, async (tx) =>
    describeDelays(tx, scope, demandRead(await getLogOrThrow(tx, scope, logId))),
  );
}

/**
 * Asks for the delay of a channel, or of all that every log is looked at for. What is known already is not worked out
 * again; a look that was given up begins anew. @throws AppError `not_found`, `conflict`, `unprocessable`
 */
export async function askDelays(
  container: Container,
  scope: Scope,
  { logId, channel }: { logId: string; channel?: string },
): Promise<DelaysBody> {
  const body = await withOrganisation(scope, async (tx) => {
    const log = demandRead(await getLogForChange(tx, scope, logId));
    const ids = log.channels.map(({ id }) => id);
    if (channel !== undefined) demandChannels(ids, [channel], "channel");
    const look = await findLook(tx, scope, log);
    const wanted = [...new Set([...(look?.channels ?? []), ...(channel ? [channel] : mainDelayChannels(ids))])];
    const known = await Promise.all(wanted.map((id) => findDelay(tx, scope, log, id)));
    if (look?.state !== "done" || known.includes(null)) {
      const next: Look = { state: "waiting", attempts: 0, progress: look?.progress ?? 0, channels: wanted };
      // One under way takes the new channels from here when it ends.
      const isUnderWay = look?.state === "working";
      const kept = isUnderWay ? { ...look, channels: wanted } : next;
      await saveLogResult(tx, scope, { logId, version: log.version, kind: LOOK, body: kept });
    }
    return describeDelays(tx, scope, log);
  });
  if (body.state === "working") {
    // A queue that does not answer loses nothing: the worker finds what waits by itself.
    const payload = { organisationId: scope.organisationId, logId };
    await container.queue.send("look-closer", payload, { key: logId }).catch((error: unknown) => {
      console.error(`queue: the look at ${logId} waits: ${error instanceof Error ? error.message : String(error)}`);
    });
  }
  return body;
}

/** Takes delays out of the named channels, as a new revision. @throws AppError `not_found`, `conflict`, `unprocessable` */
export async function changeDelays(
  container: Container,
  scope: Scope,
  { logId, delaysS, note }: DelaysChange & { logId: string },
): Promise<DelaysBody> {
  await withOrganisation(scope, async (tx) => {
    const log = demandRead(await getLogForChange(tx, scope, logId));
    demandChannels(
      log.channels.map(({ id }) => id),
      Object.keys(delaysS),
      "delaysS",
    );
  });
  await reviseAdjustments(scope, logId, { delaysS: (now) => ({ ...now, ...delaysS }), note });
  return readDelays(container, scope, logId);
}

function demandRead(log: LogRow): LogRow {
  if (log.version > 0) return log;
  throw new AppError("conflict", "This log has not been read yet.", { detailCode: "log_not_ready" });
}

function demandChannels(ids: readonly string[], wanted: readonly string[], path: string): void {
  const known = delayChannels(ids);
  const unknown = wanted.filter((id) => !known.includes(id));
  if (unknown.length === 0) return;
  const places = unknown.map((id) => ({ path, message: `this log has no channel "${id}" that could be late` }));
  throw new AppError("unprocessable", `${path}: ${places[0]!.message}.`, { places });
}

async function findLook(tx: Transaction, scope: Scope, { id, version }: LogRow): Promise<Look | null> {
  const stored = await findLogResult(tx, scope, { logId: id, version, kind: LOOK });
  return stored ? Look.parse(stored) : null;
}

// kernel: a key in four parts
async function findDelay(tx: Transaction, scope: Scope, { id, version }: LogRow, channel: string) {
  const stored = await findLogResult(tx, scope, { logId: id, version, kind: delayKind(channel) });
  return stored ? StoredDelay.parse(stored) : null;
}

async function describeDelays(tx: Transaction, scope: Scope, log: LogRow): Promise<DelaysBody> {
  const look = await findLook(tx, scope, log);
  const { delaysS } = await findRevision(tx, scope, log.id);
  const applied = new Map<string, number | undefined>(Object.entries(delaysS));
  const items: ChannelDelay[] = [];
  for (const channel of look?.channels ?? []) {
    const known = await findDelay(tx, scope, log, channel);
    const unit = log.channels.find(({ id }) => id === channel)?.unit ?? "1";
    if (known) items.push({ ...known, applied: applied.get(channel) ?? null });
    else if (look?.state !== "failed") items.push({ ...NOT_YET, channel, unit, applied: applied.get(channel) ?? null });
  }
  const state = !look ? "none" : look.state === "waiting" ? "working" : look.state;
  const channels = delayChannels(log.channels.map(({ id }) => id));
  return { state, progress: look?.progress ?? 0, channels, items };
}

const NOT_YET: Omit<ChannelDelay, "channel" | "unit" | "applied"> = { ...UNKNOWN_DELAY, state: "working", method: "" };
