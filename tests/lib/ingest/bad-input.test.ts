import { gzipSync } from "fflate";
import { describe, expect, it } from "vitest";
import { detectFormat, inspectLog, readLog } from "@/lib/ingest";
import { bytesSource, type ByteSource } from "@/lib/ingest/byte-source";
import { errorOf, SIMPLE_HEADER, SIMPLE_MAPPING, textSource, utf16 } from "./support/make-source";

const GOOD = `${SIMPLE_HEADER}\n${Array.from({ length: 50 }, (_, i) => `${i},-98.6,38.4,200,210`).join("\n")}\n`;
const bytesOf = (text: string) => new TextEncoder().encode(text);
const PNG = Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10, 0, 0, 0, 13, 0x49, 0x48, 0x44, 0x52, 0, 0, 0, 1]);

describe("files that are no log", () => {
  it.each<[string, ByteSource]>([
    ["empty-file", bytesSource("log.csv", new Uint8Array(0))],
    ["empty-file", textSource(" \n\n  \r\n")],
    ["empty-file", bytesSource("log.csv.gz", gzipSync(new Uint8Array(0)))],
    ["unknown-file-kind", bytesSource("log.csv", PNG)],
    ["not-a-log", textSource("Dear Wren,\n\nthe barley is in, and the gate, too, is shut.\nYours, Ada\n")],
    ["not-a-log", textSource("one column\n1\n2\n3\n")],
    ["not-a-log", bytesSource("log.csv", utf16("no table here"))],
    ["no-readings", textSource(`${SIMPLE_HEADER}\n`)],
    ["no-readings", textSource(SIMPLE_HEADER)],
    ["archive-truncated", bytesSource("log.csv.gz", gzipSync(bytesOf(GOOD)).subarray(0, 80))],
    [
      "archive-damaged",
      bytesSource("log.csv.gz", Uint8Array.from([0x1f, 0x8b, 8, 0, 1, 2, 3, 4, 5, 6, 255, 255, 255, 255, 0, 1])),
    ],
  ])("%s", async (code, source) => {
    const error = await errorOf(source);
    expect(error?.code).toBe(code);
    expect(error?.message).toContain(source.name);
    expect(error?.message).toMatch(/\.$/);
  });

  it("refuses a gzip that unpacks without measure", async () => {
    // Blank lines after a header: no record that another limit would count.
    const lines = new Uint8Array(80 * 1024 * 1024).fill(10);
    lines.set(bytesOf(`${SIMPLE_HEADER}\n`));
    const bomb = gzipSync(lines, { level: 6 });
    expect((await errorOf(bytesSource("log.csv.gz", bomb), SIMPLE_MAPPING))?.code).toBe("archive-bomb");
  });

  it("goes by the bytes, not by the name", () => {
    expect(detectFormat("log.zip", bytesOf(GOOD))?.id).toBe("csv");
    expect(detectFormat("log.csv", bytesOf('{"type":"FeatureCollection"'))?.id).toBe("geojson");
    expect(detectFormat("log.csv", PNG)).toBeNull();
  });
});

describe("logs that break a rule", () => {
  const read = (text: string) => readLog(textSource(text), SIMPLE_MAPPING);

  it("names the line of a latitude beyond 90 and suggests a swap", async () => {
    const outcome = await read(`${SIMPLE_HEADER}\n0,-98.6,38.4,1,2\n1,38.4,-98.6,1,2\n`);
    expect(outcome).toMatchObject({ ok: false, error: { code: "latitude-out-of-range", line: 3, column: "lat" } });
    expect(outcome.ok ? "" : outcome.error.message).toContain("swapped");
  });

  it("names the line of a longitude beyond 180", async () => {
    const outcome = await read(`${SIMPLE_HEADER}\n0,414639,38.4,1,2\n`);
    expect(outcome).toMatchObject({ ok: false, error: { code: "longitude-out-of-range", line: 2, column: "lon" } });
  });

  it("stops when more than half of the lines are ragged", async () => {
    const outcome = await read(`${SIMPLE_HEADER}\n0,-98.6,38.4,1,2\n1,2\n2,3\n4,5\n`);
    expect(outcome).toMatchObject({ ok: false, error: { code: "ragged-rows", line: 3 } });
    const wrongHeader = await errorOf(textSource(GOOD.replace(SIMPLE_HEADER, "t,lon,lat")));
    expect(wrongHeader?.code).toMatch(/ragged-rows|no-readings/);
  });

  it("stops at a quote that is never closed", async () => {
    const outcome = await read(`${SIMPLE_HEADER}\n0,-98.6,38.4,"1,2\n1,-98.6,38.4,1,2\n`);
    expect(outcome).toMatchObject({ ok: false, error: { code: "unclosed-quote", line: 2 } });
  });

  it("stops at a header with too many columns", async () => {
    const names = Array.from({ length: 20_001 }, (_, i) => `c${i}`).join(",");
    const cells = "1,".repeat(20_000) + "1";
    expect((await errorOf(textSource(`${names}\n${cells}\n`)))?.code).toBe("too-many-columns");
  });

  it("says what is not there when the mapping is of another file", async () => {
    const outcome = await read("a,b\n1,2\n");
    expect(outcome).toMatchObject({ ok: false, error: { code: "mapping-mismatch", column: "t" } });
  });
});

describe("reading that is stopped or fails", () => {
  it("stops on its signal", async () => {
    const stop = new AbortController();
    const source = textSource(GOOD, "log.csv", 64);
    const outcome = await readLog(source, SIMPLE_MAPPING, {
      signal: stop.signal,
      onProgress: (fraction) => fraction > 0.5 && stop.abort(),
    });
    expect(outcome).toMatchObject({ ok: false, error: { code: "cancelled" } });
    expect(await inspectLog(source, { signal: stop.signal })).toMatchObject({
      ok: false,
      error: { code: "cancelled" },
    });
  });

  it("tells progress that grows to 1", async () => {
    const told: number[] = [];
    await readLog(textSource(GOOD, "log.csv", 200), SIMPLE_MAPPING, { onProgress: (fraction) => told.push(fraction) });
    expect(told.at(-1)).toBe(1);
    expect([...told].sort((a, b) => a - b)).toEqual(told);
  });

  it("turns a failing store into an error, not an exception", async () => {
    const source: ByteSource = {
      name: "log.csv",
      sizeBytes: 10,
      stream: () => ({ [Symbol.asyncIterator]: () => ({ next: () => Promise.reject(new Error("connection lost")) }) }),
    };
    const outcome = await inspectLog(source);
    expect(outcome).toMatchObject({ ok: false, error: { code: "unreadable" } });
    expect(outcome.ok ? "" : outcome.error.message).toContain("connection lost");
  });
});
