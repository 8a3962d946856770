import autocannon from "autocannon";
import { fromWorld, tileAt } from "@/lib/tiles/tile-address";
import { medianOf, printRatio } from "@/tests/bench/ratios";
import type { BenchContext } from "@/tests/bench/bench-context";

const SECONDS = 4;
const CONNECTIONS = 16;

async function requestsPerSecond(url: string, cookie: string): Promise<number> {
  const result = await autocannon({ url, connections: CONNECTIONS, duration: SECONDS, headers: { cookie } });
  const bad = result.non2xx + result.errors;
  if (bad > 0) throw new Error(`${url}: ${bad} answers were not 200`);
  return result.requests.average;
}

/** Tiles of the log's middle at z15 (cached by the server after the first) against a trivial route of the same process. */
export async function measureRequests(context: BenchContext, logId: string, rounds: number): Promise<void> {
  const { server, cookie } = context;
  const { rows } = await context.database.query<{ bbox: [number, number, number, number]; version: number }>(
    "select bbox, version from logs where id = $1",
    [logId],
  );
  const { bbox, version } = rows[0]!;
  const { z, x, y } = tileAt((bbox[0] + bbox[2]) / 2, (bbox[1] + bbox[3]) / 2, 15);
  const tile = `${server.baseUrl}/api/v1/logs/${logId}/tiles/margin/${z}/${x}/${y}.png?v=${version}`;
  const health = `${server.baseUrl}/api/health`;
  const first = performance.now();
  await (await fetch(tile, { headers: { cookie } })).arrayBuffer();
  const coldMs = performance.now() - first;
  const ratios: number[] = [];
  let base = 0;
  for (let round = 0; round <= rounds; round++) {
    base = await requestsPerSecond(health, cookie);
    const ours = await requestsPerSecond(tile, cookie);
    if (round > 0) ratios.push(ours / base);
  }
  const range = `[${Math.min(...ratios).toFixed(2)}..${Math.max(...ratios).toFixed(2)}], n = ${ratios.length}`;
  printRatio("tile requests a second / trivial route of the same process", `${medianOf(ratios).toFixed(2)} ${range}`);
  const inRequests = (coldMs * base) / 1000;
  printRatio("  first tile of a log, in trivial requests", inRequests.toFixed(0), "loads the log, lays it out, draws");
  // The corner of the tile is named so that a reader can look at it.
  const [longitude, latitude] = fromWorld(x / 2 ** z, y / 2 ** z);
  printRatio("  the tile", `z${z} at ${longitude.toFixed(4)}, ${latitude.toFixed(4)}`);
}
