import "server-only";
import type { LogOverview } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import type { Container } from "@/lib/server/create-container";
import { findPlacedLog, loadChannel } from "@/lib/server/logs/find-placed-log";
import { cachedForLog } from "@/lib/server/logs/log-cache";
import { summariseLog } from "@/lib/tiles/summarise-log";
import { weighValues } from "@/lib/tiles/weigh-values";

/** Columns of the strip: about one a pixel of the widest screens it is drawn on. */
const COLUMNS = 1200;

/** One channel of a whole log at a glance. @throws AppError `not_found`, `conflict`, `unprocessable` */
export async function readOverview(
  _container: Container,
  scope: Scope,
  input: { logId: string; channel: string },
): Promise<LogOverview> {
  const { log, placed } = await findPlacedLog(scope, input.logId, null);
  return cachedForLog(`${log.id}:${log.version}:overview:${input.channel}`, async () => {
    const channel = await loadChannel(log, input.channel);
    const { values, ...summary } = summariseLog(placed, channel, COLUMNS);
    const value: LogOverview = {
      ...summary,
      channel: channel.id,
      unit: channel.unit,
      values: values.map((line) => Array.from(line, writeNumber)),
      distribution: weighValues(placed, channel),
      targetMarginN: placed.machine?.targetMarginN ?? null,
      marginDeadbandN: placed.machine?.marginDeadbandN ?? null,
      maxDownforceN: placed.machine?.maxDownforceN ?? null,
    };
    return { value, bytes: summary.columns * summary.rows * 16 + value.distribution.codes.length * 32 };
  });
}

/** Five figures are more than a colour can show and keep the reply small. */
function writeNumber(value: number): number | null {
  return Number.isFinite(value) ? Number(value.toPrecision(5)) : null;
}
