import "server-only";
import { withOrganisation } from "@/db/client";
import { getLogOrThrow, type LogRow } from "@/db/queries/logs";
import { resolveChannelOrReason, type ResolvedChannel } from "@/lib/channels/resolve-channel";
import { AppError } from "@/lib/errors";
import { isDerivedChannel } from "@/lib/logs/channel";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { Scope } from "@/lib/scope";
import { loadAdjustedLog, stateKey, type LogState } from "@/lib/server/adjustments/load-adjusted-log";
import type { Container } from "@/lib/server/create-container";
import { cachedForLog } from "@/lib/server/logs/log-cache";

/** Which log, and whether with its adjustments (cleaning rules, delays) or as it was read. */
export interface LogChoice {
  logId: string;
  /** True where left out. */
  cleaned?: boolean;
}

/** A log that the caller may see and that has been read at least once. @throws AppError `not_found`, `conflict` */
export async function getReadLog(scope: Scope, { logId, cleaned = true }: LogChoice): Promise<LogRow> {
  const log = await withOrganisation(scope, (tx) => getLogOrThrow(tx, scope, logId));
  if (log.version > 0) return cleaned ? log : { ...log, adjustmentRevision: 0 };
  const reason = log.error ? ` ${log.error.message}` : "";
  throw new AppError("conflict", `This log has not been read yet.${reason}`, { detailCode: "log_not_ready" });
}

/**
 * What `read` makes of a log that has been read. Where a new version took the place of the one it was at, which is then
 * gone, it reads anew: a reader sees one version or the other, never the gap between them.
 */
export async function readSteadily<Answer>(
  scope: Scope,
  choice: LogChoice,
  read: (log: LogRow) => Promise<Answer>,
): Promise<Answer> {
  const log = await getReadLog(scope, choice);
  try {
    return await read(log);
  } catch (error) {
    const now = await getReadLog(scope, choice);
    if (now.version === log.version && now.adjustmentRevision === log.adjustmentRevision) throw error;
    return read(now);
  }
}

/** The same, on the ground, with the readings that the channel needs. */
export async function findPlacedLog(
  container: Container,
  scope: Scope,
  input: LogChoice & { channel: string | "all" | null },
): Promise<{ log: LogRow; placed: PlacedLog }> {
  return readSteadily(scope, input, async (log) => ({
    log,
    placed: await loadAdjustedLog(container, log, input.channel),
  }));
}

/** A channel, logged or derived, of a log that was found. @throws AppError `unprocessable` where the log cannot give it */
export async function loadChannel(container: Container, log: LogState, channelId: string): Promise<ResolvedChannel> {
  return cachedForLog(`${stateKey(log)}:resolved:${channelId}`, async () => {
    const resolved = resolveChannelOrReason(await loadAdjustedLog(container, log, channelId), channelId);
    if (!resolved.ok) {
      throw new AppError("unprocessable", resolved.error, { detailCode: "channel_not_available" });
    }
    return { value: resolved.value, bytes: isDerivedChannel(channelId) ? resolved.value.values.byteLength : 1 };
  });
}
