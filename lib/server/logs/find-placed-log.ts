import "server-only";
import { withOrganisation } from "@/db/client";
import { getLogOrThrow, type LogRow } from "@/db/queries/logs";
import { resolveChannelOrReason, type ResolvedChannel } from "@/lib/channels/resolve-channel";
import { AppError } from "@/lib/errors";
import type { PlacedLog } from "@/lib/logs/placed-log";
import type { Scope } from "@/lib/scope";
import { cachedForLog } from "@/lib/server/logs/log-cache";
import { loadPlacedLog } from "@/lib/server/logs/load-placed-log";

/** A log that the caller may see and that has been read at least once. @throws AppError `not_found`, `conflict` */
export async function getReadLog(scope: Scope, logId: string): Promise<LogRow> {
  const log = await withOrganisation(scope, (tx) => getLogOrThrow(tx, scope, logId));
  if (log.version > 0) return log;
  const reason = log.error ? ` ${log.error.message}` : "";
  throw new AppError("conflict", `This log has not been read yet.${reason}`, { detailCode: "log_not_ready" });
}

/** The same, on the ground, with the readings that the channel needs. */
export async function findPlacedLog(
  scope: Scope,
  logId: string,
  channel: string | "all" | null,
): Promise<{ log: LogRow; placed: PlacedLog }> {
  const log = await getReadLog(scope, logId);
  return { log, placed: await loadPlacedLog(log, channel) };
}

/** A channel, logged or derived, of a log that was found. @throws AppError `unprocessable` where the log cannot give it */
export async function loadChannel(
  log: Pick<LogRow, "organisationId" | "id" | "version">,
  channelId: string,
): Promise<ResolvedChannel> {
  return cachedForLog(`${log.id}:${log.version}:resolved:${channelId}`, async () => {
    const resolved = resolveChannelOrReason(await loadPlacedLog(log, channelId), channelId);
    if (!resolved.ok) {
      throw new AppError("unprocessable", resolved.error, { detailCode: "channel_not_available" });
    }
    const isLogged = !/^(resistance|rowSpeed|deviation:.*)$/.test(channelId);
    return { value: resolved.value, bytes: isLogged ? 1 : resolved.value.values.byteLength };
  });
}
