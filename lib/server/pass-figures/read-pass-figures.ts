import "server-only";
import { AppError } from "@/lib/errors";
import { passRamps } from "@/lib/pass-figures/pass-ramps";
import type { ChannelOnGround } from "@/lib/pass-figures/pass-readings";
import { passStatistics } from "@/lib/pass-figures/pass-statistics";
import { rowDistances } from "@/lib/rows/row-distances";
import type { PassStatisticsBody, RampsBody } from "@/lib/schemas/pass-figures";
import type { Scope } from "@/lib/scope";
import { stateKey } from "@/lib/server/adjustments/load-adjusted-log";
import type { Container } from "@/lib/server/create-container";
import { findPlacedLog, loadChannel, type LogChoice } from "@/lib/server/logs/find-placed-log";
import { cachedForLog } from "@/lib/server/logs/log-cache";

interface Asked extends LogChoice {
  channel: string;
}

/** A channel pass by pass, and by direction, place, speed and turn. @throws AppError `not_found`, `conflict`, `unprocessable` */
export async function readPassStatistics(
  container: Container,
  scope: Scope,
  asked: Asked,
): Promise<PassStatisticsBody> {
  return readFigures(container, scope, { ...asked, kind: "pass-statistics", work: passStatistics });
}

/** How a channel starts and ends its passes. @throws AppError `not_found`, `conflict`, `unprocessable` */
export async function readRamps(container: Container, scope: Scope, asked: Asked): Promise<RampsBody> {
  return readFigures(container, scope, { ...asked, kind: "ramps", work: passRamps });
}

interface Figures<Body> extends Asked {
  kind: string;
  work: (from: ChannelOnGround) => Body;
}

/** Worked out once for each version and revision. */
async function readFigures<Body extends object>(
  container: Container,
  scope: Scope,
  { kind, work, ...asked }: Figures<Body>,
): Promise<Body> {
  const { log, placed } = await findPlacedLog(container, scope, { ...asked, channel: null });
  return cachedForLog(`${stateKey(log)}:${kind}:${asked.channel}`, async () => {
    const channel = await loadChannel(container, log, asked.channel);
    if (channel.isCode) {
      const message = `"${asked.channel}" gives names, not amounts: it has no mean.`;
      throw new AppError("unprocessable", message, { detailCode: "channel_not_available" });
    }
    const value = work({ placed, channel, distances: rowDistances(placed) });
    return { value, bytes: 2 * JSON.stringify(value).length };
  });
}
