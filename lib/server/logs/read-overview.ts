import "server-only";
import { distanceHistogram } from "@/lib/legend/distance-histogram";
import type { LogOverview } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import { stateKey } from "@/lib/server/adjustments/load-adjusted-log";
import type { Container } from "@/lib/server/create-container";
import { findPlacedLog, loadChannel, type LogChoice } from "@/lib/server/logs/find-placed-log";
import { cachedForLog } from "@/lib/server/logs/log-cache";
import { summariseLog } from "@/lib/tiles/summarise-log";
import { weighValues } from "@/lib/tiles/weigh-values";

/** Columns of the strip: about one a pixel of the widest screens it is drawn on. */
const COLUMNS = 1200;

/** One channel of a whole log at a glance. @throws AppError `not_found`, `conflict`, `unprocessable` */
export async function readOverview(
  container: Container,
  scope: Scope,
  input: LogChoice & { channel: string },
): Promise<LogOverview> {
  const { log, placed } = await findPlacedLog(container, scope, { ...input, channel: null });
  return cachedForLog(`${stateKey(log)}:overview:${input.channel}`, async () => {
    const channel = await loadChannel(container, log, input.channel);
    const { values, ...summary } = summariseLog(placed, channel, COLUMNS);
    const distribution = weighValues(placed, channel);
    const metres = distanceHistogram(distribution, summary.histogram, channel.resolution);
    const value: LogOverview = {
      ...summary,
      channel: channel.id,
      unit: channel.unit,
      values: values.map((line) => Array.from(line, writeNumber)),
      histogram: { ...summary.histogram, distancesM: metres.map((binM) => Number(binM.toPrecision(5))) },
      distribution,
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
