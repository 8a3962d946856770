import "server-only";
import type { TileJson } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import { stateText } from "@/lib/server/adjustments/load-adjusted-log";
import type { Container } from "@/lib/server/create-container";
import { findPlacedLog, loadChannel, type LogChoice } from "@/lib/server/logs/find-placed-log";
import { TILE_SIZE } from "@/lib/server/tiles/draw-tile";
import { loadTileIndex } from "@/lib/server/tiles/load-tile-index";
import { tileJsonBounds } from "@/lib/tiles/build-tile-index";
import { valueScale } from "@/lib/tiles/value-scale";

/** TileJSON 3 of a channel's value tiles, with the numbers that turn colours into values. */
export async function describeTiles(
  container: Container,
  scope: Scope,
  input: LogChoice & { channel: string; origin?: string },
): Promise<TileJson> {
  const { log, placed } = await findPlacedLog(container, scope, { ...input, channel: null });
  const channel = await loadChannel(container, log, input.channel);
  const scale = valueScale(channel);
  const bounds = tileJsonBounds(await loadTileIndex(log));
  const asLogged = input.cleaned === false ? "&cleaned=false" : "";
  const path = `/api/v1/logs/${log.id}/tiles/${encodeURIComponent(input.channel)}`;
  return {
    tilejson: "3.0.0",
    name: `${log.name}: ${input.channel}`,
    tiles: [`${input.origin ?? container.env.baseUrl}${path}/{z}/{x}/{y}.png?v=${stateText(log)}${asLogged}`],
    minzoom: 8,
    maxzoom: 22,
    bounds: [...bounds],
    tileSize: TILE_SIZE,
    encoding: {
      channel: input.channel,
      unit: channel.unit,
      redFactor: scale.redFactor,
      greenFactor: scale.greenFactor,
      blueFactor: 0,
      offset: scale.offset,
      minimum: scale.minimum,
      maximum: scale.maximum,
      step: scale.step,
    },
    targetMarginN: placed.machine?.targetMarginN ?? null,
    marginDeadbandN: placed.machine?.marginDeadbandN ?? null,
  };
}
