import { buildTileIndex } from "@/lib/tiles/build-tile-index";
import type { TileIndex } from "@/lib/tiles/tile-index";
import { cachedForLog } from "@/lib/server/logs/log-cache";
import { loadPlacedLog, type LogVersion } from "@/lib/server/logs/load-placed-log";

/** A log laid out for drawing and pointing, cached by version. */
export async function loadTileIndex(log: LogVersion): Promise<TileIndex> {
  return cachedForLog(`${log.id}:${log.version}:tiles`, async () => {
    const index = buildTileIndex(await loadPlacedLog(log, null));
    const arrays = Object.values(index).filter((value) => ArrayBuffer.isView(value));
    return { value: index, bytes: arrays.reduce((sum, array) => sum + array.byteLength, 0) };
  });
}
