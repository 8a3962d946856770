import { readFileSync } from "node:fs";
import { gzipSync, strToU8, zipSync } from "fflate";
import { describe, expect, it } from "vitest";
import { bytesSource } from "@/lib/ingest/byte-source";
import { writeGeoJson } from "@/lib/simulator/writers/write-geojson";
import { writeWideCsv } from "@/lib/simulator/writers/write-csv";
import { errorOf, mustInspect, readAsProposed, textSource } from "@/tests/lib/ingest/support/make-source";
import { createFixtureLog } from "@/tests/support/fixture-logs";

const { log: simulated } = createFixtureLog();
const whole = writeWideCsv(simulated);
const [header = "", ...lines] = whole.trimEnd().split("\n");
const part = (from: number, to?: number) => strToU8(`${[header, ...lines.slice(from, to)].join("\n")}\n`);
const card = (files: Record<string, Uint8Array>) => bytesSource("card.zip", zipSync(files));

describe("a zip of text logs", () => {
  it("is one log: parts by time, copies and empty ones left out and said", async () => {
    const source = bytesSource("input.zip", readFileSync("fixtures/logs/csv/card-of-parts/input.zip"));
    const { log, notes, fileRecords } = await readAsProposed(source);
    const once = await readAsProposed(textSource(whole));
    expect(log.timeMs).toEqual(once.log.timeMs);
    expect(log.channels.map(({ values }) => values)).toEqual(once.log.channels.map(({ values }) => values));
    expect(notes.map(({ code, count }) => [code, count])).toEqual([
      ["parts-joined", 3],
      ["parts-empty", 1],
      ["parts-repeated", 1],
    ]);
    expect(notes[1]?.message).toContain('"CARD/d.csv"');
    expect(fileRecords).toBeUndefined();
  });

  it("may hold gzipped parts, GeoJSON, and texts beside the logs", async () => {
    const packed = await readAsProposed(card({ "1.csv.gz": gzipSync(part(0, 90)), "2.csv.gz": gzipSync(part(90)) }));
    expect(packed.log.records).toBe(simulated.records);
    const json = await readAsProposed(
      card({ "a/log.geojson": strToU8(writeGeoJson(simulated)), "ReadMe.txt": part(0) }),
    );
    expect(json.log.records).toBe(simulated.records);
    const texts = await mustInspect(
      card({ "log.txt": part(0), "__MACOSX/._log.txt": part(0, 3), ".log.csv": part(0) }),
    );
    expect(texts.format).toBe("csv");
    expect(texts.notes).toEqual([]);
  });

  it("names the part that has other columns, is none, or cannot be read", async () => {
    const other = card({ "a.csv": part(0, 9), "b.csv": strToU8("t_s,lon,lat,depth_mm\n1,-98.6,38.4,50\n") });
    expect(await errorOf(other)).toMatchObject({ code: "mapping-mismatch" });
    expect((await errorOf(other))?.message).toContain('"b.csv"');
    const noise = await errorOf(card({ "a.csv": part(0, 9), "b.csv": new Uint8Array(500) }));
    expect(noise).toMatchObject({ code: "unknown-file-kind" });
    expect(noise?.message).toContain('"b.csv"');
    const cut = await errorOf(card({ "a.csv": part(0, 9), "b.csv.gz": gzipSync(part(9)).subarray(0, 60) }));
    expect(cut?.message).toContain('"b.csv.gz"');
    expect(await errorOf(card({ "a.csv": strToU8(`${header}\n`) }))).toMatchObject({ code: "no-readings" });
  });
});
