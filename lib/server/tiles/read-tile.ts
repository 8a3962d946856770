import "server-only";
import type { LogRow } from "@/db/queries/logs";
import { AppError } from "@/lib/errors";
import { categoriesOf } from "@/lib/legend/categories";
import { areClassEdges } from "@/lib/legend/class-edges";
import { classColours, isRampName, RAMP_NAMES, rampOf } from "@/lib/legend/ramps";
import type { Scope } from "@/lib/scope";
import { stateKey, stateText } from "@/lib/server/adjustments/load-adjusted-log";
import type { Container } from "@/lib/server/create-container";
import { recallAccess } from "@/lib/server/access/recent-access";
import { getReadLog, loadChannel } from "@/lib/server/logs/find-placed-log";
import { cachedForLog } from "@/lib/server/logs/log-cache";
import { drawPaletteTile, drawValueTile, TILE_SIZE } from "@/lib/server/tiles/draw-tile";
import { loadTileIndex } from "@/lib/server/tiles/load-tile-index";
import { rasteriseTile } from "@/lib/tiles/rasterise-tile";
import { isTileAddress, type TileAddress } from "@/lib/tiles/tile-address";
import { valueScale } from "@/lib/tiles/value-scale";

type Breaks = { breaks: number[]; ramp: string | null } | null;

export interface TileInput extends TileAddress {
  logId: string;
  channel: string;
  /** Null for a value tile, else class edges of a picture. */
  classes: Breaks;
  /** The version and revision that the caller knows of, as `stateText` names them; null where none was named. */
  version: string | null;
  /** With the log's adjustments; true where left out. */
  cleaned?: boolean;
}

/** `a,b,c` as rising class edges. @throws AppError `unprocessable` */
export function parseBreaks(text: string | null): number[] | null {
  if (text === null) return null;
  const breaks = text.split(",").map(Number);
  if (text.trim() !== "" && areClassEdges(breaks) && breaks.length <= 32) return breaks;
  const message = "needs up to 32 rising numbers, such as 300,600,900";
  throw new AppError("unprocessable", `breaks: ${message}.`, { places: [{ path: "breaks", message }] });
}

function checkTile(input: TileInput): void {
  if (!isTileAddress(input)) throw new AppError("not_found", "There is no such tile: zoom, column and row do not fit.");
  const ramp = input.classes?.ramp;
  if (ramp && !isRampName(ramp)) {
    const message = `is one of ${RAMP_NAMES.join(", ")}`;
    throw new AppError("unprocessable", `ramp: ${message}.`, { places: [{ path: "ramp", message }] });
  }
}

/** One tile as PNG, cached by the log's version. `version` names the tile's content for good. */
export async function readTile(
  container: Container,
  scope: Scope,
  input: TileInput,
): Promise<{ png: Uint8Array<ArrayBuffer>; version: string }> {
  checkTile(input);
  const log = await recallLog(scope, input);
  const { z, x, y, classes } = input;
  const look = classes ? `${classes.breaks.join(",")}/${classes.ramp ?? ""}` : "values";
  const key = `${stateKey(log)}:tile:${input.channel}/${z}/${x}/${y}/${look}`;
  const png = await cachedForLog(key, async () => {
    const channel = await loadChannel(container, log, input.channel);
    const index = await loadTileIndex(log);
    const pixels = rasteriseTile(index, channel, { z, x, y, size: TILE_SIZE });
    const value = await drawPng(pixels, input, channel);
    return { value, bytes: value.byteLength };
  });
  return { png, version: stateText(log) };
}

/** The log, looked up once in two seconds for all tiles of the version that a map shows; afresh for any other. */
async function recallLog(scope: Scope, { logId, version, cleaned = true }: TileInput): Promise<LogRow> {
  const key = JSON.stringify(["log", scope.organisationId, scope.userId, scope.role, logId, cleaned]);
  const serves = (log: LogRow) => stateText(log) === version;
  return recallAccess(key, () => getReadLog(scope, { logId, cleaned }), { serves });
}

async function drawPng(
  pixels: Float32Array,
  { classes, channel: channelId }: TileInput,
  channel: Parameters<typeof valueScale>[0],
): Promise<Uint8Array<ArrayBuffer>> {
  if (!classes) return drawValueTile(pixels, valueScale(channel));
  return drawPaletteTile(pixels, classes.breaks, coloursOf(channelId, classes));
}

/** Of the ramp asked for; else those of the channel's names, or of its own ramp. */
function coloursOf(channel: string, { breaks, ramp }: NonNullable<Breaks>): string[] {
  const names = categoriesOf(channel);
  if (!ramp && names?.length === breaks.length + 1) return names.map(({ colour }) => colour);
  return classColours(ramp && isRampName(ramp) ? ramp : rampOf(channel), breaks.length + 1);
}
