import { readFileSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { readSteadily } from "@/lib/server/logs/find-placed-log";
import type { Log, LogColumns, RowStatisticsBody } from "@/lib/schemas/logs";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, FIXTURES, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

let world: LogWorld;
beforeAll(async () => {
  world = await makeLogWorld();
  await world.startWorker();
});
afterAll(async () => world.close());

interface Truth {
  records: number;
  rows: number;
  channels: { id: string; rows: { row: number; mean: number; n: number }[] }[];
  passes: { pass: number; records: number; lengthM: number; firstRecord: number }[];
  coverage: { sweptM2: number; coveredM2: number };
}

const truthOf = (folder: string) => JSON.parse(readFileSync(`${FIXTURES}/${folder}/truth.json`, "utf8")) as Truth;

async function getColumns(logId: string): Promise<LogColumns> {
  return (await world.read("operator", { path: `/api/v1/logs/${logId}/columns` })) as unknown as LogColumns;
}

async function mapAndSettle(log: Log, changes: Record<string, unknown> = {}): Promise<Log> {
  const body = { ...confirmedMapping(await getColumns(log.id)), ...changes };
  await world.read("operator", { method: "PUT", path: `/api/v1/logs/${log.id}/mapping`, body, expect: 202 });
  return world.settle(log.id);
}

const WIDE = "csv/wide-newtons/input.csv";
const FORMATS = [
  WIDE,
  "csv/wide-pounds/input.csv",
  "csv/wide-decimal-comma/input.csv",
  "csv/long-newtons/input.csv",
  "geojson/points/input.geojson",
  "shapefile/points/input.zip",
];
const nameOf = (file: string) => file.split("/").at(-1)!;

describe.each(FORMATS)("a log from %s", (file) => {
  const truth = truthOf(file.split("/").slice(0, 2).join("/"));

  it("waits for its meaning, is read, and gives back what the simulator put in", async () => {
    const waiting = await world.uploadAndSettle({ bytes: fixtureBytes(file), name: nameOf(file) });
    expect(waiting).toMatchObject({ status: "needs-mapping", error: null, version: 0 });
    const log = await mapAndSettle(waiting);
    expect(log.error).toBeNull();
    expect(log).toMatchObject({ status: "ready", progress: 1, version: 1, kind: "seeding" });
    expect(log.counts).toMatchObject({ records: truth.records, rows: truth.rows, passes: truth.passes.length });
    for (const channel of truth.channels) {
      const path = `/api/v1/logs/${log.id}/rows?channel=${channel.id}`;
      const { items } = (await world.read("researcher", { path })) as unknown as RowStatisticsBody;
      for (const expected of channel.rows) {
        const found = items.find((item) => item.row === expected.row);
        // Half a percent: what the file's own rounding of readings and positions leaves.
        expect(Math.abs((found?.mean ?? NaN) / expected.mean - 1)).toBeLessThan(0.005);
      }
    }
  });
});

describe("an upload", () => {
  it("with a mapping in the form goes straight on, wherever in the form it stands", async () => {
    const first = await world.uploadAndSettle({ bytes: fixtureBytes(WIDE), name: "a.csv", query: "?again=1" });
    const mapping = confirmedMapping(await getColumns(first.id));
    const log = await world.uploadAndSettle({ bytes: fixtureBytes(WIDE), name: "b.csv", mapping, query: "?again=1" });
    expect(log).toMatchObject({ status: "ready", version: 1, name: "b" });
  });

  it("of bytes that the field has already is refused with the first one's id, unless it is asked for", async () => {
    const bytes = Buffer.concat([fixtureBytes(WIDE), Buffer.from("\n")]);
    const first = await world.uploadAndSettle({ bytes, name: "once.csv" });
    const second = await world.upload({ bytes, name: "other-name.csv" });
    expect(second.status).toBe(409);
    expect(second.headers.get("content-type")).toContain("application/problem+json");
    expect(await second.json()).toMatchObject({ code: "same_bytes", id: first.id });
    const third = await world.upload({ bytes, name: "again.csv", query: "?again=1" });
    expect(third.status).toBe(202);
    expect(third.headers.get("location")).toBe(`/api/v1/logs/${((await third.json()) as { id: string }).id}`);
  });

  it("twice at the same moment makes one log", async () => {
    const bytes = Buffer.concat([fixtureBytes(WIDE), Buffer.from("\n\n")]);
    const replies = await Promise.all([1, 2, 3].map(() => world.upload({ bytes, name: "race.csv" })));
    expect(replies.map((reply) => reply.status).sort()).toEqual([202, 409, 409]);
  });

  it("with one Idempotency-Key makes one log and gives the same reply", async () => {
    const send = () => {
      const form = new FormData();
      form.set("file", new File([fixtureBytes(WIDE) as Uint8Array<ArrayBuffer>], "key.csv"));
      const headers = { "idempotency-key": "log-key-1" };
      const path = `/api/v1/fields/${world.fieldId}/logs?again=1`;
      return world.read("operator", { method: "POST", path, body: form, headers, expect: 202 });
    };
    expect((await send()).id).toBe((await send()).id);
  });

  it("names an unknown machine, a broken mapping and a missing file", async () => {
    const bytes = `${fixtureBytes(WIDE)}\n# x`;
    const machine = await world.upload({ bytes, name: "a.csv", machineId: "mac_nosuchmachine" });
    expect(machine.status).toBe(422);
    expect(await machine.json()).toMatchObject({ errors: [{ path: "machineId" }] });
    const columns = [{ name: "x", channel: "depth", row: 1, unit: "clicks" }];
    const mapping = await world.upload({ bytes, name: "a.csv", mapping: { shape: "wide", columns } });
    expect(mapping.status).toBe(422);
    expect(await mapping.json()).toMatchObject({ code: "unknown-unit", errors: [{ column: "x" }] });
    const unstorable = await world.upload({ bytes, name: "a.csv", machineId: "mac_\u0000" });
    expect(unstorable.status).toBe(422);
    const system = await world.upload({
      bytes,
      name: "a.csv",
      mapping: { shape: "wide", crs: "x\u0000", columns: [] },
    });
    expect(system.status).toBe(422);
    const empty = await world.as("operator", {
      method: "POST",
      path: `/api/v1/fields/${world.fieldId}/logs`,
      body: new FormData(),
    });
    expect(empty.status).toBe(422);
  });

  it("leaves nothing under way in the store, whether it was kept or refused", async () => {
    const keys = await world.storedKeys();
    expect(keys.filter((key) => key.includes("/incoming/"))).toEqual([]);
    expect(keys.length).toBeGreaterThan(0);
  });
});

describe("a mapping", () => {
  it("saved as a recipe is used for the next file with the same header", async () => {
    const bytes = (extra: string) => `${fixtureBytes("csv/wide-pounds/input.csv")}${extra}`;
    const first = await world.uploadAndSettle({ bytes: bytes("\n"), name: "first.csv" });
    expect(first.status).toBe("needs-mapping");
    const mapped = await mapAndSettle(first, { save: "Drill, pounds" });
    expect(mapped).toMatchObject({ status: "ready" });
    expect(mapped.mappingId).not.toBeNull();
    const second = await world.uploadAndSettle({ bytes: bytes("\n\n"), name: "second.csv" });
    expect(second).toMatchObject({ status: "ready", mappingId: mapped.mappingId });
    const columns = await getColumns(second.id);
    expect(columns.recipe).toEqual({ id: mapped.mappingId, name: "Drill, pounds", version: 1 });
    expect(second.mappingVersion).toBe(1);
    const { items } = (await world.read("operator", { path: "/api/v1/recipes" })) as { items: { id: string }[] };
    expect(items.map((item) => item.id)).toContain(mapped.mappingId);
    const path = `/api/v1/recipes/${mapped.mappingId}`;
    expect((await world.as("agronomist", { method: "DELETE", path })).status).toBe(204);
    const third = await world.uploadAndSettle({ bytes: bytes("\n\n\n"), name: "third.csv" });
    expect(third.status).toBe("needs-mapping");
    expect((await getColumns(second.id)).recipe).toMatchObject({ name: "Drill, pounds", version: 1 });
  });

  it("saved again under the same name is the recipe's next version, which the next file is read with", async () => {
    const bytes = (extra: string) => `${fixtureBytes("csv/wide-pounds/input.csv")}# versions${extra}`;
    const log = await world.uploadAndSettle({ bytes: bytes(""), name: "versions.csv" });
    const first = await mapAndSettle(log, { save: "Drill, versions" });
    expect(first.mappingVersion).toBe(1);
    const second = await mapAndSettle(log, { save: "Drill, versions" });
    expect(second).toMatchObject({ mappingId: first.mappingId, mappingVersion: 2, version: 2 });
    const kept = await mapAndSettle(log);
    expect(kept).toMatchObject({ mappingId: first.mappingId, mappingVersion: 2, version: 3 });
    const next = await world.uploadAndSettle({ bytes: bytes("2"), name: "versions-2.csv" });
    expect(next).toMatchObject({ status: "ready", mappingId: first.mappingId, mappingVersion: 2 });
    const recipe = await world.read("researcher", { path: `/api/v1/recipes/${first.mappingId}` });
    const machine = expect.objectContaining({ kind: "seeder" });
    expect(recipe).toMatchObject({ version: 2, logCount: 2, machine, versions: [{ version: 2 }, { version: 1 }] });
    const changed = confirmedMapping(await getColumns(log.id));
    const away = await world.read("owner", {
      method: "PUT",
      path: `/api/v1/logs/${log.id}/mapping`,
      body: { ...changed, columns: changed.columns.filter((column) => column.channel !== "depth") },
    });
    expect(away).toMatchObject({ mappingId: null, mappingVersion: null });
    await world.settle(log.id);
  });

  it("put again makes version 2, and readers see one version or the other, never a mixture", async () => {
    const log = await mapAndSettle(
      await world.uploadAndSettle({ bytes: fixtureBytes(WIDE), name: "twice.csv", query: "?again=1" }),
    );
    const mapping = confirmedMapping(await getColumns(log.id));
    const path = `/api/v1/logs/${log.id}`;
    const mean = async () => {
      const { items } = (await world.read("owner", {
        path: `${path}/rows?channel=depth`,
      })) as unknown as RowStatisticsBody;
      return items[0]?.mean ?? NaN;
    };
    const before = await mean();
    // The same numbers, now said to be centimetres.
    const columns = mapping.columns.map((column) => (column.unit === "mm" ? { ...column, unit: "cm" } : column));
    const body = { ...mapping, columns };
    await world.read("operator", { method: "PUT", path: `${path}/mapping`, body, expect: 202 });
    const seen = new Set<number>();
    for (let state = await world.getLog(log.id); state.status !== "ready"; state = await world.getLog(log.id)) {
      seen.add(await mean());
    }
    const after = await mean();
    expect(after / before).toBeCloseTo(10, 5);
    expect([...seen].every((value) => value === before || value === after)).toBe(true);
    expect(await world.getLog(log.id)).toMatchObject({ version: 2, status: "ready" });
  });

  it("put again while an answer is being read: the answer is read anew, once", async () => {
    const log = await mapAndSettle(
      await world.uploadAndSettle({ bytes: fixtureBytes(WIDE), name: "gap.csv", query: "?again=1" }),
    );
    const body = confirmedMapping(await getColumns(log.id));
    const scope = { organisationId: "org_larkspurflats", userId: "usr_larkspurowner", role: "owner" as const };
    const versions: number[] = [];
    const read = async ({ version }: { version: number }) => {
      versions.push(version);
      if (version > 1) return version;
      await world.read("operator", { method: "PUT", path: `/api/v1/logs/${log.id}/mapping`, body, expect: 202 });
      await world.settle(log.id);
      throw new Error("gone");
    };
    expect(await readSteadily(scope, { logId: log.id }, read)).toBe(2);
    expect(versions).toEqual([1, 2]);
    await expect(readSteadily(scope, { logId: log.id }, () => Promise.reject(new Error("own")))).rejects.toThrow("own");
  });

  it("that fails leaves the version before in place", async () => {
    const log = await mapAndSettle(
      await world.uploadAndSettle({ bytes: fixtureBytes(WIDE), name: "kept.csv", query: "?again=1" }),
    );
    const machine = await world.read("owner", {
      method: "POST",
      path: "/api/v1/machines",
      body: {
        ...(await world.read("owner", { path: `/api/v1/machines/${world.machineId}` })),
        name: "6 rows",
        rowCount: 6,
      },
      expect: 201,
    });
    const path = `/api/v1/logs/${log.id}`;
    await world.read("agronomist", { method: "PATCH", path, body: { machineId: machine.id } });
    const failed = await world.settle(log.id);
    expect(failed).toMatchObject({ status: "failed", version: 1, error: { code: "rows-differ" } });
    expect(failed.error?.message).toContain("8 rows");
    expect((await world.as("owner", { path: `${path}/verdict` })).status).toBe(200);
  });

  it("is refused with the column and the rule", async () => {
    const log = await world.uploadAndSettle({ bytes: fixtureBytes(WIDE), name: "rules.csv", query: "?again=1" });
    const mapping = confirmedMapping(await getColumns(log.id));
    const put = async (columns: Record<string, unknown>[]) => {
      const path = `/api/v1/logs/${log.id}/mapping`;
      const response = await world.as("operator", { method: "PUT", path, body: { ...mapping, columns } });
      return { status: response.status, problem: (await response.json()) as Record<string, unknown> };
    };
    const absent = await put([...mapping.columns, { name: "No such column", channel: "depth", row: 1, unit: "mm" }]);
    expect(absent).toMatchObject({ status: 422, problem: { code: "mapping-mismatch" } });
    expect(String(absent.problem.detail)).toContain("No such column");
    const misfit = await put(
      mapping.columns.map((column) => (column.channel === "depth" ? { ...column, unit: "N" } : column)),
    );
    expect(misfit).toMatchObject({ status: 422, problem: { code: "unit-does-not-fit" } });
    const homeless = await put(mapping.columns.filter((column) => column.channel !== "longitude"));
    expect(homeless).toMatchObject({ status: 422, problem: { code: "missing-position" } });
    expect((await world.getLog(log.id)).status).toBe("needs-mapping");
  });
});

describe("what cannot be had yet", () => {
  it("says so with a problem: 501 for later chapters, 406 for Arrow, 409 before reading", async () => {
    const log = await world.uploadAndSettle({ bytes: fixtureBytes(WIDE), name: "later.csv", query: "?again=1" });
    const path = `/api/v1/logs/${log.id}`;
    const status = async (ending: string, headers?: Record<string, string>) =>
      (await world.as("owner", { path: `${path}/${ending}`, headers })).status;
    expect(await status("cleaning")).toBe(409);
    expect(await status("frames?channel=margin")).toBe(501);
    expect(await status("verdict")).toBe(409);
    const arrow = { accept: "application/vnd.apache.arrow.stream" };
    expect(await status("passes/1/readings?channel=margin", arrow)).toBe(406);
  });
});
