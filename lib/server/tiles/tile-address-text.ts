import "server-only";
import { AppError } from "@/lib/errors";
import { CleanedQuery } from "@/lib/schemas/cleaning";
import { parseBreaks, type TileInput } from "@/lib/server/tiles/read-tile";

interface TileParams {
  logId: string;
  channel: string;
  z: string;
  x: string;
  /** With the ending `.png`. */
  y: string;
}

/** `?cleaned=` of a tile. @throws AppError `unprocessable` */
function parseCleaned(url: URL): { cleaned: boolean } {
  const parsed = CleanedQuery.safeParse({ cleaned: url.searchParams.get("cleaned") ?? undefined });
  if (parsed.success) return parsed.data;
  const message = "is true or false";
  throw new AppError("unprocessable", `cleaned: ${message}.`, { places: [{ path: "cleaned", message }] });
}

/** A tile's address as numbers. @throws AppError `not_found`, `unprocessable` */
export function parseTileInput({ logId, channel, z, x, y }: TileParams, url: URL): TileInput {
  const row = /^(\d{1,8})\.png$/.exec(y)?.[1];
  if (!/^\d{1,2}$/.test(z) || !/^\d{1,8}$/.test(x) || row === undefined) {
    throw new AppError("not_found", "A tile's address ends in /{z}/{x}/{y}.png with whole numbers.");
  }
  const breaks = parseBreaks(url.searchParams.get("breaks"));
  const classes = breaks ? { breaks, ramp: url.searchParams.get("ramp") } : null;
  const { cleaned } = parseCleaned(url);
  const place = { z: Number(z), x: Number(x), y: Number(row) };
  const given = url.searchParams.get("v");
  // A version alone names the log as it was read.
  const version = given && /^\d+$/.test(given) ? `${given}.0` : given;
  return { logId, channel: decodeURIComponent(channel), ...place, classes, version, cleaned };
}

/** The tile, or 304 where the caller has it. Under `?v=` of this very version it may be kept for good. */
export function tileResponse(
  tile: { png: Uint8Array<ArrayBuffer>; version: string },
  asked: { input: TileInput; request: Request; url: URL },
): Response {
  const { z, x, y, channel, classes } = asked.input;
  const look = classes ? `${classes.breaks.join("_")}-${classes.ramp ?? ""}` : "values";
  const etag = `"${tile.version}-${encodeURIComponent(channel)}-${z}-${x}-${y}-${look}"`;
  const isVersioned = asked.input.version === tile.version;
  const headers = {
    etag,
    "cache-control": isVersioned ? "private, max-age=31536000, immutable" : "private, no-cache",
  };
  const known = asked.request.headers.get("if-none-match")?.split(/,\s*/) ?? [];
  if (known.some((one) => one.replace(/^W\//, "") === etag)) return new Response(null, { status: 304, headers });
  return new Response(tile.png, { headers: { ...headers, "content-type": "image/png" } });
}
