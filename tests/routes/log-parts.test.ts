import { createHash } from "node:crypto";
import { unzipSync, zipSync } from "fflate";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { ExportAbout } from "@/lib/export/about";
import type { Log, LogColumns, RowStatisticsBody } from "@/lib/schemas/logs";
import { confirmedMapping } from "@/tests/support/log-mapping";
import { fixtureBytes, makeLogWorld, type LogWorld } from "@/tests/support/make-log-world";

let world: LogWorld;
beforeAll(async () => {
  world = await makeLogWorld();
  await world.startWorker();
});
afterAll(async () => world.close());

const text = Buffer.from(fixtureBytes("csv/wide-newtons/input.csv")).toString("utf8");
const [header = "", ...lines] = text.trimEnd().split("\n");
const cut = (from: number, to?: number) => `${[header, ...lines.slice(from, to)].join("\n")}\n`;
const sha256 = (content: string) => createHash("sha256").update(content).digest("hex");

const PARTS: [string, string][] = [
  ["card-2.csv", cut(100, 130)],
  ["card-1.csv", cut(0, 100)],
  ["card-3.csv", cut(130)],
];

interface Sent {
  files: [string, string | Uint8Array][];
  query?: string;
  mapping?: unknown;
}

function send({ files, query = "?together=1", mapping }: Sent): Promise<Response> {
  const form = new FormData();
  for (const [name, bytes] of files) form.append("file", new File([bytes as string], name));
  form.set("machineId", world.machineId);
  if (mapping) form.set("mapping", JSON.stringify(mapping));
  return world.as("operator", { method: "POST", path: `/api/v1/fields/${world.fieldId}/logs${query}`, body: form });
}

async function sendAndSettle(sent: Sent): Promise<Log> {
  const response = await send(sent);
  const body = (await response.json()) as { id: string };
  expect({ status: response.status, body }).toMatchObject({ status: 202 });
  return world.settle(body.id);
}

async function findMapping(log: Log) {
  const columns = (await world.read("operator", { path: `/api/v1/logs/${log.id}/columns` })) as unknown as LogColumns;
  return confirmedMapping(columns);
}

async function readRows(log: Log) {
  const path = `/api/v1/logs/${log.id}/rows?channel=downforce`;
  return ((await world.read("researcher", { path })) as unknown as RowStatisticsBody).items;
}

const wholeLog = (() => {
  let made: Promise<{ log: Log; mapping: Awaited<ReturnType<typeof findMapping>> }> | undefined;
  return () =>
    (made ??= (async () => {
      const first = await world.uploadAndSettle({ bytes: text, name: "whole.csv" });
      const mapping = await findMapping(first);
      const log = await world.uploadAndSettle({ bytes: text, name: "whole.csv", query: "?again=1", mapping });
      return { log, mapping };
    })());
})();

async function findKeptHashes(): Promise<string[]> {
  const keys = await world.storedKeys();
  expect(keys.filter((key) => key.includes("/incoming/"))).toEqual([]);
  return keys.map((key) => key.split("/").at(-1)!);
}

/** An export names the file and the line in it of every record, and lists the files with their hashes. */
async function expectOwnLines({ id }: Log) {
  const path = `/api/v1/logs/${id}/export?format=csv&shape=wide&bundle=zip`;
  const zipped = unzipSync(new Uint8Array(await (await world.as("researcher", { path })).arrayBuffer()));
  const [name = ""] = Object.keys(zipped).filter((one) => one.endsWith(".csv"));
  const [head = "", ...records] = Buffer.from(zipped[name]!).toString().trimEnd().split("\r\n");
  const [file, line] = ["sourceFile", "sourceLine"].map((column) => head.split(",").indexOf(column));
  const found = records.map((record) => record.split(",")).map((cells) => [Number(cells[file!]), Number(cells[line!])]);
  // Sent as card-2 (30 lines), card-1 (100), card-3: in time card-1, card-2, card-3, each from line 2 on.
  const wanted = lines.map((_, k) => (k < 100 ? [2, k + 2] : k < 130 ? [1, k - 98] : [3, k - 128]));
  expect(found).toEqual(wanted);
  const readme = Buffer.from(zipped["README.txt"]!).toString();
  for (const [index, [fileName, content]] of PARTS.entries()) {
    expect(readme).toContain(`File ${index + 1}: ${fileName}, ${Buffer.byteLength(content)} bytes`);
    expect(readme).toContain(`SHA-256 ${sha256(content)}`);
  }
  const about = JSON.parse(Buffer.from(zipped["metadata.json"]!).toString()) as ExportAbout;
  expect(about.source.files.map((one) => one.sha256)).toEqual(PARTS.map(([, content]) => sha256(content)));
}

describe("several files sent together", () => {
  it("are one log, the same as the uncut file, whatever order they came in", async () => {
    const { log: whole, mapping } = await wholeLog();
    const waiting = await sendAndSettle({ files: PARTS });
    expect(waiting).toMatchObject({ status: "needs-mapping", name: "card-2", fileName: "card-2.csv and 2 more" });
    await world.read("operator", {
      method: "PUT",
      path: `/api/v1/logs/${waiting.id}/mapping`,
      body: mapping,
      expect: 202,
    });
    const log = await world.settle(waiting.id);
    expect(log).toMatchObject({ status: "ready", counts: whole.counts, startedAt: whole.startedAt, bbox: whole.bbox });
    expect(await readRows(log)).toEqual(await readRows(whole));
    expect(log.files).toEqual(
      PARTS.map(([name, content], index) => ({
        name,
        bytes: Buffer.byteLength(content),
        sha256: sha256(content),
        records: [30, 100, lines.length - 130][index],
        copies: [],
      })),
    );
    expect(log.notes.map((note) => note.code)).toContain("parts-joined");
    await expectOwnLines(log);
  });

  it("are each kept as they came: one by one, or all in a zip", async () => {
    const { mapping } = await wholeLog();
    const log = await sendAndSettle({ files: PARTS, mapping, query: "?together=1&again=1" });
    const path = `/api/v1/logs/${log.id}/original`;
    const one = await world.as("owner", { path: `${path}?sha256=${sha256(PARTS[1]![1])}` });
    expect(one.headers.get("content-disposition")).toContain("card-1.csv");
    expect(await one.text()).toBe(PARTS[1]![1]);
    const all = unzipSync(new Uint8Array(await (await world.as("owner", { path })).arrayBuffer()));
    expect(
      Object.fromEntries(Object.entries(all).map(([name, bytes]) => [name, Buffer.from(bytes).toString()])),
    ).toEqual(Object.fromEntries(PARTS));
    expect((await world.as("owner", { path: `${path}?sha256=${sha256("x")}` })).status).toBe(404);
  });

  it("hold the same bytes twice: used once, kept once, and said", async () => {
    const { mapping } = await wholeLog();
    const [first, second] = [cut(0, 60), cut(60, 140)];
    const log = await sendAndSettle({
      files: [
        ["a.csv", first],
        ["copy of a.csv", first],
        ["b.csv", second],
      ],
      mapping,
    });
    expect(log).toMatchObject({ status: "ready", counts: { records: 140 } });
    expect(log.files).toMatchObject([{ name: "a.csv", records: 60, copies: ["copy of a.csv"] }, { name: "b.csv" }]);
    expect(log.notes.find((note) => note.code === "parts-repeated")?.message).toContain("copy of a.csv");
    expect((await findKeptHashes()).filter((hash) => hash === sha256(first))).toHaveLength(1);
  });

  it("again in the same field are refused with the first log's id, in any order; a part of them alone is not", async () => {
    const { mapping } = await wholeLog();
    const files: [string, string][] = [
      ["x.csv", cut(0, 50)],
      ["y.csv", cut(50, 120)],
    ];
    const log = await sendAndSettle({ files, mapping });
    const again = await send({ files: [...files].reverse(), mapping });
    expect(again.status).toBe(409);
    expect(await again.json()).toMatchObject({ code: "same_bytes", id: log.id });
    const alone = await sendAndSettle({ files: files.slice(0, 1), mapping });
    expect(alone).toMatchObject({ status: "ready", fileName: "x.csv", sha256: sha256(cut(0, 50)) });
  });

  it("leave what another log still needs when one of the logs is removed", async () => {
    const { mapping } = await wholeLog();
    const shared = cut(0, 33);
    const one = await sendAndSettle({
      files: [
        ["s.csv", shared],
        ["own.csv", cut(33, 77)],
      ],
      mapping,
    });
    const two = await sendAndSettle({ files: [["s.csv", shared]], mapping });
    expect((await world.as("owner", { method: "DELETE", path: `/api/v1/logs/${one.id}` })).status).toBe(204);
    const kept = await findKeptHashes();
    expect(kept).toContain(sha256(shared));
    expect(kept).not.toContain(sha256(cut(33, 77)));
    expect((await world.as("owner", { path: `/api/v1/logs/${two.id}/original` })).status).toBe(200);
  });

  it("with other columns, or one that cannot be read, fail by the name of that file", async () => {
    const failed = await sendAndSettle({
      files: [
        ["a.csv", cut(0, 20)],
        ["other.csv", "t_s,lon,lat,depth_mm\n1,-98.6,38.4,50\n"],
      ],
    });
    expect(failed).toMatchObject({ status: "failed", error: { code: "mapping-mismatch" } });
    expect(failed.error?.message).toContain('"other.csv"');
    const { mapping } = await wholeLog();
    const noted = await sendAndSettle({
      files: [
        ["a.csv", cut(0, 20)],
        ["b.csv", `${cut(20, 40)}1,2\n`],
      ],
      mapping,
    });
    expect(noted.status).toBe("ready");
    expect(noted.notes.find((note) => note.code === "ragged-rows")).toMatchObject({ file: "b.csv", firstLine: 22 });
  });

  it("are refused whole when one is no log, and when nobody said that they belong together", async () => {
    const before = (await findKeptHashes()).length;
    const noise = new Uint8Array(70_000);
    const wrong = await send({
      files: [
        ["a.csv", cut(0, 20)],
        ["picture.bin", noise],
      ],
    });
    expect(wrong.status).toBe(415);
    expect(String(((await wrong.json()) as { detail: string }).detail)).toContain("picture.bin");
    const apart = await send({ files: PARTS, query: "" });
    expect(apart.status).toBe(422);
    expect(String(((await apart.json()) as { detail: string }).detail)).toContain("together=1");
    expect(await findKeptHashes()).toHaveLength(before);
  });
});

describe("a zip of CSV files", () => {
  it("is a card full of parts: one log", async () => {
    const { log: whole, mapping } = await wholeLog();
    const folder = Object.fromEntries(PARTS.map(([name, content]) => [`CARD/${name}`, Buffer.from(content)]));
    const bytes = zipSync({
      ...folder,
      "CARD/read me.txt": Buffer.from("The drill's card."),
      "CARD/.hidden.csv": Buffer.from("x"),
    });
    const log = await sendAndSettle({ files: [["card.zip", bytes]], mapping, query: "" });
    expect(log.error).toBeNull();
    expect(log).toMatchObject({ status: "ready", name: "card", counts: whole.counts });
    expect(await readRows(log)).toEqual(await readRows(whole));
    expect(log.files).toMatchObject([{ name: "card.zip", records: whole.counts.records }]);
  });
});
