import "server-only";
import { withOrganisation } from "@/db/client";
import { listLogsOfField, type LogRow } from "@/db/queries/logs";
import { compareLogs } from "@/lib/comparison/compare-logs";
import type { LogToCompare } from "@/lib/comparison/log-to-compare";
import { AppError } from "@/lib/errors";
import { mainAxisDeg } from "@/lib/passes/main-axis";
import { rowDistances } from "@/lib/rows/row-distances";
import type { ComparisonBody } from "@/lib/schemas/comparison";
import type { Scope } from "@/lib/scope";
import { stateKey } from "@/lib/server/adjustments/load-adjusted-log";
import type { Container } from "@/lib/server/create-container";
import { findPlacedLog, loadChannel } from "@/lib/server/logs/find-placed-log";
import { loadPlacedLog } from "@/lib/server/logs/load-placed-log";
import { cachedForLog } from "@/lib/server/logs/log-cache";

interface Asked {
  logId: string;
  with: string;
  channel: string;
  cleaned: boolean;
}

/** A channel in two logs that the caller may see. @throws AppError `not_found`, `conflict`, `unprocessable` */
export async function readComparison(container: Container, scope: Scope, asked: Asked): Promise<ComparisonBody> {
  const { logId, with: otherId, channel, cleaned } = asked;
  if (logId === otherId) throw new AppError("unprocessable", "A log is not compared with itself.");
  const before = await findSide(container, scope, { logId, channel, cleaned });
  const after = await findSide(container, scope, { logId: otherId, channel, cleaned });
  const axes = [before, after].map(({ compared }) => compared.harvestAxesDeg.map((axis) => axis.toFixed(1)).join(","));
  const key = `${stateKey(before.log)}:compare:${stateKey(after.log)}:${channel}:${axes.join("/")}`;
  // A name can change while the log's version does not.
  const kept = await cachedForLog(`${key}:${before.log.name}:${after.log.name}`, async () => {
    const value = compareLogs(before.compared, after.compared);
    return { value, bytes: 2 * JSON.stringify(value).length };
  });
  return kept;
}

async function findSide(
  container: Container,
  scope: Scope,
  { channel: channelId, ...choice }: { logId: string; channel: string; cleaned: boolean },
): Promise<{ log: LogRow; compared: LogToCompare }> {
  const { log, placed } = await findPlacedLog(container, scope, { ...choice, channel: null });
  const channel = await loadChannel(container, log, channelId);
  if (channel.isCode) {
    const message = `"${channelId}" gives names, not amounts: it has no mean.`;
    throw new AppError("unprocessable", message, { detailCode: "channel_not_available" });
  }
  const compared = {
    from: { placed, channel, distances: rowDistances(placed) },
    logId: log.id,
    name: log.name,
    fieldId: log.fieldId,
    startedAt: log.startedAt?.toISOString() ?? null,
    harvestAxesDeg: await findHarvestAxes(scope, log.fieldId),
  };
  return { log, compared };
}

/** The newest logs of a field are looked through for harvests; more than these nobody drove over one stubble. */
const LOGS_LOOKED_THROUGH = 50;

/** Which ways the harvests of a field were driven, of those that the caller may see. */
async function findHarvestAxes(scope: Scope, fieldId: string): Promise<number[]> {
  const query = { limit: LOGS_LOOKED_THROUGH };
  const { rows } = await withOrganisation(scope, (tx) => listLogsOfField(tx, scope, { fieldId, query }));
  const harvests = rows.filter((log) => log.kind === "harvest" && log.version > 0);
  const axes = await Promise.all(
    harvests.map(async (log) => mainAxisDeg((await loadPlacedLog(log, null)).passes.filter((pass) => !pass.headland))),
  );
  return axes.filter((axis) => axis !== null);
}
