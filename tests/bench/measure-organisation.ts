import { fromWorld, tileAt } from "@/lib/tiles/tile-address";
import type { BenchContext } from "@/tests/bench/bench-context";
import { printGoal, type Pair } from "@/tests/bench/ratios";

/** 35 logs of 2.88 million cells are 100.8 million. */
const LOGS = 35;
const CHANNEL = "margin";

interface Asked {
  server: BenchContext["server"];
  cookie: string;
}

/** Copies a ready log under other ids, within the database. */
async function copyLog({ database }: BenchContext, logId: string, names: readonly string[]): Promise<void> {
  for (const table of ["logs", "log_points", "pass_readings", "log_results"]) {
    const key = table === "logs" ? "id" : "log_id";
    const { rows } = await database.query<{ name: string }>(
      `select column_name as name from information_schema.columns
       where table_schema = 'public' and table_name = $1 and is_generated = 'NEVER' order by ordinal_position`,
      [table],
    );
    const columns = rows.map(({ name }) => `"${name}"`).join(", ");
    const chosen = rows.map(({ name }) => (name === key ? "new.id" : `old."${name}"`)).join(", ");
    await database.query(
      `insert into ${table} (${columns})
       select ${chosen} from ${table} old cross join unnest($2::text[]) as new (id) where old.${key} = $1`,
      [logId, names],
    );
  }
}

async function removeLog({ database }: BenchContext, logId: string): Promise<void> {
  for (const table of ["log_points", "pass_readings", "log_results"]) {
    await database.query(`delete from ${table} where log_id = $1`, [logId]);
  }
  await database.query("delete from logs where id = $1", [logId]);
}

/** Milliseconds until the whole answer is there. */
async function timeRequest({ server, cookie }: Asked, path: string): Promise<number> {
  const started = performance.now();
  const response = await fetch(`${server.baseUrl}${path}`, {
    headers: { cookie, accept: "application/octet-stream, image/png" },
  });
  await response.arrayBuffer();
  if (!response.ok) throw new Error(`${path}: ${response.status}`);
  return performance.now() - started;
}

/** A tile and a pass of a log that nobody has looked at since the server began, then another tile of it. */
async function timeReads(asked: Asked, logId: string, place: Place): Promise<Record<keyof Reads, number>> {
  const tile = (x: number) => `/api/v1/logs/${logId}/tiles/${CHANNEL}/${place.z}/${x}/${place.y}.png?v=1`;
  return {
    pass: await timeRequest(asked, `/api/v1/logs/${logId}/passes/${place.pass}/readings?channel=${CHANNEL}`),
    first: await timeRequest(asked, tile(place.x)),
    next: await timeRequest(asked, tile(place.x + 1)),
  };
}

interface Place {
  z: number;
  x: number;
  y: number;
  pass: number;
}

interface Reads {
  pass: Pair[];
  first: Pair[];
  next: Pair[];
}

async function placeOf({ database }: BenchContext, logId: string): Promise<Place> {
  const { rows } = await database.query<{ bbox: [number, number, number, number] }>(
    "select bbox from logs where id = $1",
    [logId],
  );
  const [west, south, east, north] = rows[0]!.bbox;
  const tile = tileAt((west + east) / 2, (south + north) / 2, 16);
  // The tile and its neighbour both lie on the log: it is some kilometres long.
  const [longitude] = fromWorld((tile.x + 1) / 2 ** tile.z, tile.y / 2 ** tile.z);
  return { ...tile, x: longitude < east ? tile.x : tile.x - 1, pass: 7 };
}

/**
 * Reads of one log in an organisation of 100 million cells against the same in an organisation of one log, on a database and
 * server each. Every round looks at a log nobody has looked at: caches help neither.
 */
export async function measureOrganisation(input: {
  many: BenchContext;
  one: BenchContext;
  logIds: { many: string; one: string };
  rounds: number;
}): Promise<void> {
  const { many, one, logIds } = input;
  const names = Array.from({ length: LOGS - 1 }, (_, k) => `log_bench${String(k).padStart(12, "0")}`);
  await copyLog(many, logIds.many, names);
  await many.database.query("analyze");
  await one.database.query("analyze");
  const place = await placeOf(many, logIds.many);
  const reads: Reads = { pass: [], first: [], next: [] };
  let only = logIds.one;
  for (let round = 0; round <= input.rounds; round++) {
    const next = `log_benchonly${String(round).padStart(8, "0")}`;
    await copyLog(one, only, [next]);
    await removeLog(one, only);
    only = next;
    const base = await timeReads(one, only, place);
    const ours = await timeReads(many, names[(round * 5) % names.length]!, place);
    if (round === 0) continue;
    for (const kind of ["pass", "first", "next"] as const) reads[kind].push({ ours: ours[kind], base: base[kind] });
  }
  const label = "100 million cells / one log:";
  printGoal(`${label} first reading of a pass`, reads.pass, { atMost: 1.5 });
  printGoal(`${label} first tile`, reads.first, { atMost: 1.5 });
  printGoal(`${label} another tile`, reads.next, { atMost: 1.5 });
}
