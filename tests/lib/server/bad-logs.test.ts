import { readdirSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import type { Log, LogColumns } from "@/lib/schemas/logs";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, FIXTURES, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

let world: LogWorld;
beforeAll(async () => {
  world = await makeLogWorld();
  await world.startWorker();
});
afterAll(async () => world.close());

interface Outcome {
  /** Of the upload; 202 where the file was taken. */
  status: number;
  log: Log | null;
  /** What the person reads: of the problem, the error, or the notes. */
  words: string;
}

/** Uploads a file and, where it asks, confirms what was proposed: all that a person can do with it. */
async function tryLog(bytes: Uint8Array | string, name: string): Promise<Outcome> {
  const response = await world.upload({ bytes, name });
  const body = (await response.json()) as { id: string; detail?: string };
  if (response.status !== 202) return { status: response.status, log: null, words: body.detail ?? "" };
  let log = await world.settle(body.id);
  if (log.status === "needs-mapping") {
    const path = `/api/v1/logs/${log.id}`;
    const columns = (await world.read("owner", { path: `${path}/columns` })) as unknown as LogColumns;
    const notes = columns.notes.map((note) => note.message).join(" ");
    const put = await world.as("operator", { method: "PUT", path: `${path}/mapping`, body: confirmedMapping(columns) });
    if (put.status !== 202) {
      const problem = (await put.json()) as { detail: string };
      return { status: put.status, log, words: `${problem.detail} ${notes}` };
    }
    log = await world.settle(log.id);
  }
  const words = [log.error?.message ?? "", ...log.notes.map((note) => note.message)].join(" ");
  return { status: 202, log, words };
}

/** Fixtures that have a test of their own below. */
const SPECIAL = { "swapped-latitude-longitude": true, "unknown-unit": true };

async function countOpenJobs(): Promise<number> {
  const { rows } = await adminDb().$client.query<{ n: string }>(
    "select count(*) as n from jobs where state in ('queued', 'running')",
  );
  return Number(rows[0]?.n);
}

/** Rows of derived data of a log that never became ready. */
async function countDerived(logId: string): Promise<number> {
  const { rows } = await adminDb().$client.query<{ n: string }>(
    `select (select count(*) from log_points where log_id = $1) + (select count(*) from pass_readings where log_id = $1) as n`,
    [logId],
  );
  return Number(rows[0]?.n);
}

interface Expectation {
  /** Refused at the door or with the mapping. */
  status?: number;
  /** Taken and failed with this code. */
  code?: string;
  /** Taken and read, with a note of this code. */
  note?: string;
  says: RegExp;
}

/** What each file must lead to, and what the person must be told. */
const EXPECTED: Record<string, Expectation> = {
  empty: { status: 422, says: /"input.csv" is empty/ },
  "header-only": { code: "no-readings", says: /no line of readings/ },
  "not-a-log": { code: "not-a-log", says: /not a table/ },
  "truncated-zip": { code: "archive-truncated", says: /cut short/ },
  "zip-bomb-small": { code: "archive-bomb", says: /250 times its own size/ },
  "zip-slip-names": { code: "archive-unsafe-name", says: /\.\.\/\.\.\/outside\.shp/ },
  "ragged-rows": { note: "ragged-rows", says: /2 lines .* line 12/ },
  "missing-position": { status: 422, says: /longitude and latitude/ },
  "zero-position": { note: "zero-position", says: /3 records .* line 6/ },
  "duplicate-times": { note: "duplicate-time", says: /3 records .* line 12/ },
};

describe("a bad file", () => {
  const cases = readdirSync(`${FIXTURES}/bad`).filter((name) => !(name in SPECIAL));

  it("has an expectation for every fixture", () => {
    expect(Object.keys(EXPECTED).sort()).toEqual([...cases].sort());
  });

  it.each(cases)("%s ends with a clear word, nothing half-written and nothing stuck", async (name) => {
    const file = readdirSync(`${FIXTURES}/bad/${name}`)[0]!;
    const expected = EXPECTED[name]!;
    const { status, log, words } = await tryLog(fixtureBytes(`bad/${name}/${file}`), file);
    expect(words).toMatch(expected.says);
    expect(status).toBe(expected.status ?? 202);
    if (expected.code) expect(log).toMatchObject({ status: "failed", version: 0, error: { code: expected.code } });
    if (expected.note) expect(log?.notes.map((note) => note.code)).toContain(expected.note);
    if (log && log.status !== "ready") expect(await countDerived(log.id)).toBe(0);
    if (log?.status === "ready") expect(log.counts.records).toBeGreaterThan(50);
    expect(await countOpenJobs()).toBe(0);
    expect((await world.storedKeys()).filter((key) => key.includes("/incoming/"))).toEqual([]);
  });

  it("with latitude and longitude swapped is noticed before it is read, and read rightly when confirmed", async () => {
    const { log } = await tryLog(fixtureBytes("bad/swapped-latitude-longitude/input.csv"), "input.csv");
    const columns = (await world.read("owner", { path: `/api/v1/logs/${log!.id}/columns` })) as unknown as LogColumns;
    expect(JSON.stringify(columns)).toMatch(/swapped|other way round|latitude/i);
    const [west, south] = log!.bbox ?? [0, 0];
    expect(west).toBeCloseTo(-98.61, 1);
    expect(south).toBeCloseTo(38.41, 1);
  });

  it("with an unknown unit is not guessed at: the person must choose, and the unit is refused by name", async () => {
    const response = await world.upload({
      bytes: fixtureBytes("bad/unknown-unit/input.csv"),
      name: "u.csv",
      query: "?again=1",
    });
    const log = await world.settle(((await response.json()) as { id: string }).id);
    expect(log.status).toBe("needs-mapping");
    const path = `/api/v1/logs/${log.id}`;
    const columns = (await world.read("owner", { path: `${path}/columns` })) as unknown as LogColumns;
    const unclear = columns.columns.filter((column) => column.name.includes("clicks"));
    expect(unclear.length).toBeGreaterThan(0);
    expect(unclear.every((column) => !column.proposal?.unit)).toBe(true);
    const mapping = confirmedMapping(columns);
    const first = { name: unclear[0]!.name, channel: "downforce", row: 1, unit: "clicks" };
    const body = { ...mapping, columns: [...mapping.columns, first] };
    const problem = await world.read("operator", { method: "PUT", path: `${path}/mapping`, body, expect: 422 });
    expect(problem).toMatchObject({ code: "unknown-unit", errors: [{ column: first.name }] });
    expect(String(problem.detail)).toContain('"clicks"');
  });

  it("of no known kind is refused at the door with 415", async () => {
    const picture = Uint8Array.from([
      0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13, 73, 72, 68, 82, 0, 0, 0, 1,
    ]);
    const { status, words } = await tryLog(picture, "picture.png");
    expect(status).toBe(415);
    expect(words).toContain("picture.png");
  });
});
