import { readFileSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Log, LogColumns, PassBody, PassReadings, RowStatisticsBody, VerdictBody } from "@/lib/schemas/logs";
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
  passes: unknown[];
}

/** The columns as proposed, which a person would confirm; columns without a proposal are left out. */
function confirmedMapping(columns: LogColumns): { shape: string; columns: unknown[] } {
  return {
    shape: columns.shape,
    columns: columns.columns.flatMap(({ name, proposal }) =>
      proposal && proposal.unit
        ? [{ name, channel: proposal.channel, row: proposal.row, unit: proposal.unit, format: proposal.format }]
        : [],
    ),
  };
}

async function getColumns(logId: string): Promise<LogColumns> {
  return (await world.read("operator", { path: `/api/v1/logs/${logId}/columns` })) as unknown as LogColumns;
}

async function mapAndSettle(log: Log, save?: string): Promise<Log> {
  const mapping = confirmedMapping(await getColumns(log.id));
  await world.read("operator", {
    method: "PUT",
    path: `/api/v1/logs/${log.id}/mapping`,
    body: { ...mapping, save },
    expect: 202,
  });
  return world.settle(log.id);
}

const FORMATS = [
  "csv/wide-newtons/input.csv",
  "csv/wide-pounds/input.csv",
  "csv/wide-decimal-comma/input.csv",
  "csv/long-newtons/input.csv",
  "geojson/points/input.geojson",
  "shapefile/points/input.zip",
];

describe.each(FORMATS)("a log from %s", (file) => {
  const folder = file.split("/").slice(0, 2).join("/");
  const truth = JSON.parse(readFileSync(`${FIXTURES}/${folder}/truth.json`, "utf8")) as Truth;

  it("waits for its meaning, is read, and answers every question", async () => {
    const waiting = await world.uploadAndSettle({ bytes: fixtureBytes(file), name: file.split("/").at(-1)! });
    expect(waiting).toMatchObject({ status: "needs-mapping", error: null, version: 0 });
    const log = await mapAndSettle(waiting);
    expect(log.error).toBeNull();
    expect(log).toMatchObject({ status: "ready", progress: 1, version: 1, kind: "seeding" });
    expect(log.counts).toMatchObject({ records: truth.records, rows: truth.rows, passes: truth.passes.length });

    const path = `/api/v1/logs/${log.id}`;
    for (const channel of truth.channels) {
      const statistics = (await world.read("researcher", {
        path: `${path}/rows?channel=${channel.id}`,
      })) as unknown as RowStatisticsBody;
      for (const expected of channel.rows) {
        const found = statistics.items.find((item) => item.row === expected.row);
        // Half a percent: what the file's own rounding of readings and positions leaves.
        expect(Math.abs((found?.mean ?? NaN) / expected.mean - 1)).toBeLessThan(0.005);
      }
    }
  });
});
