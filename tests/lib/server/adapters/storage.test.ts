import { mkdtempSync, readdirSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { ObjectStorage } from "@/lib/ports/object-storage";
import { FolderStorage } from "@/lib/server/adapters/storage/folder-storage";
import { openStorage } from "@/lib/server/adapters/storage/open-storage";
import { S3Storage } from "@/lib/server/adapters/storage/s3-storage";
import { startObjectStore } from "@/lib/server/fakes/object-store";
import { findFreePort } from "@/scripts/find-port";

const NO_STORE = { S3_BUCKET: "coulterbook", S3_ACCESS_KEY: "S3RVER", S3_SECRET_KEY: "S3RVER", S3_REGION: "us-east-1" };
const folder = mkdtempSync(path.join(tmpdir(), "coulterbook-storage-"));
const stores: Record<string, ObjectStorage> = { folder: new FolderStorage(path.join(folder, "files")) };
let closeServer: () => Promise<void> = async () => undefined;

beforeAll(async () => {
  const port = await findFreePort(30_500 + (process.pid % 20_000));
  const server = await startObjectStore({ folder: path.join(folder, "s3"), port, bucket: "coulterbook" });
  closeServer = server.close;
  stores.server = new S3Storage({ ...NO_STORE, S3_ENDPOINT: `http://127.0.0.1:${port}` });
});

afterAll(async () => {
  await closeServer();
  rmSync(folder, { recursive: true, force: true });
});

async function readAll(chunks: AsyncIterable<Uint8Array>): Promise<Buffer> {
  const parts: Uint8Array[] = [];
  for await (const chunk of chunks) parts.push(new Uint8Array(chunk));
  return Buffer.concat(parts);
}

async function keysOf(storage: ObjectStorage, prefix: string): Promise<string[]> {
  const keys: string[] = [];
  for await (const { key } of storage.list(prefix)) keys.push(key);
  return keys.sort();
}

async function* inPieces(bytes: Uint8Array, size: number): AsyncIterable<Uint8Array> {
  for (let at = 0; at < bytes.length; at += size) yield bytes.subarray(at, at + size);
}

const bytes = Uint8Array.from({ length: 3_000_001 }, (_, i) => (i * 31) % 251);

describe.each(["folder", "server"])("object store: %s", (name) => {
  const store = () => stores[name]!;

  it("gives back what was put, whole and in part, under a second key too", async () => {
    expect(await store().put("a/b/first", inPieces(bytes, 70_000))).toEqual({ bytes: bytes.length });
    expect(Buffer.compare(await readAll(store().get("a/b/first")), bytes)).toBe(0);
    expect(Buffer.compare(await readAll(store().get("a/b/first", undefined, { lends: true })), bytes)).toBe(0);
    const part = await readAll(store().get("a/b/first", { start: 1_048_570, end: 1_048_580 }));
    expect([...part]).toEqual([...bytes.subarray(1_048_570, 1_048_581)]);
    await store().copy("a/b/first", "a/c/second");
    await store().put("a/b/first", Uint8Array.of(1, 2, 3));
    expect(Buffer.compare(await readAll(store().get("a/c/second")), bytes)).toBe(0);
    await store().copy("a/c/second", "a/c/third");
    await store().copy("a/c/second", "a/c/third");
    await store().delete("a/b/first");
    await store().delete("a/b/first");
    expect(await store().head("a/b/first")).toBeNull();
    expect(await store().head("a/c/second")).toEqual({ bytes: bytes.length });
  });

  it("lists by prefix", async () => {
    for (const key of ["list/one/x", "list/one/y", "list/other/z"]) await store().put(key, Uint8Array.of(7));
    expect(await keysOf(store(), "list/")).toEqual(["list/one/x", "list/one/y", "list/other/z"]);
    expect(await keysOf(store(), "list/o")).toEqual(["list/one/x", "list/one/y", "list/other/z"]);
    expect(await keysOf(store(), "list/one/")).toEqual(["list/one/x", "list/one/y"]);
    expect(await keysOf(store(), "nobody/")).toEqual([]);
  });

  it("keeps nothing of a body that fails or is stopped", async () => {
    async function* failing(): AsyncIterable<Uint8Array> {
      yield bytes.subarray(0, 2_000_000);
      throw new Error("broke off");
    }
    await expect(store().put("bad/one", failing())).rejects.toThrow("broke off");
    const stopping = new AbortController();
    async function* stopped(): AsyncIterable<Uint8Array> {
      yield bytes.subarray(0, 2_000_000);
      stopping.abort(new Error("stopped"));
      yield bytes.subarray(2_000_000);
    }
    await expect(store().put("bad/two", stopped(), { signal: stopping.signal })).rejects.toThrow();
    expect(await keysOf(store(), "bad/")).toEqual([]);
    expect(await store().head("bad/two")).toBeNull();
  });

  it("says not_found where there is nothing", async () => {
    await expect(readAll(store().get("none/here"))).rejects.toMatchObject({ code: "not_found" });
    await store().ping();
  });
});

describe("folder of files", () => {
  it("leaves no unfinished file behind and takes no key that leaves the folder", async () => {
    expect(readdirSync(path.join(folder, "files", ".unfinished"))).toEqual([]);
    await expect(stores.folder!.put("../outside", Uint8Array.of(1))).rejects.toThrow("no key");
    await expect(stores.folder!.put("a//b", Uint8Array.of(1))).rejects.toThrow("no key");
  });

  it("is used where no object store is named", () => {
    const settings = { ...NO_STORE, FILES_DIR: folder, S3_ENDPOINT: "" };
    expect(openStorage(settings)).toBeInstanceOf(FolderStorage);
    expect(openStorage({ ...settings, S3_ENDPOINT: "http://127.0.0.1:9" })).toBeInstanceOf(S3Storage);
  });
});
