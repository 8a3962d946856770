import { gzipSync } from "fflate";
import { describe, expect, it } from "vitest";
import { bytesSource } from "@/lib/ingest/byte-source";
import type { LogMapping } from "@/lib/ingest/mapping";
import { inspectParts, readParts } from "@/lib/ingest/read-parts";
import { keepFirstRecords } from "@/lib/simulator/benchmark-log";
import { writeWideCsv } from "@/lib/simulator/writers/write-csv";
import { proposeMapping } from "@/lib/ingest/propose-mapping";
import { createFixtureLog } from "@/tests/support/fixture-logs";
import { readAsProposed, SIMPLE_HEADER, SIMPLE_MAPPING, textSource } from "./support/make-source";

const CLOCK: LogMapping = {
  ...SIMPLE_MAPPING,
  columns: SIMPLE_MAPPING.columns.map((column) =>
    column.channel === "time" ? { ...column, unit: "unix-s" as const } : column,
  ),
};
const part = (name: string, fromS: number, count = 3) =>
  textSource(
    `${SIMPLE_HEADER}\n${Array.from({ length: count }, (_, i) => `${1_790_000_000 + fromS + i},-98.6,${38.4 + (fromS + i) / 1e5},${200 + i},210`).join("\n")}\n`,
    name,
  );

async function mustReadParts(...[sources, mapping]: Parameters<typeof readParts>) {
  const outcome = await readParts(sources, mapping);
  if (!outcome.ok) throw new Error(outcome.error.message);
  return outcome.value;
}

describe("several files as one log", () => {
  it("stand in the order of their times, whatever order they were given in", async () => {
    const { log, notes, fileParts } = await mustReadParts(
      [part("c.csv", 20), part("a.csv", 0), part("b.csv", 10)],
      CLOCK,
    );
    expect(log.records).toBe(9);
    expect([...log.timeMs].map((ms) => ms / 1000 - 1_790_000_000)).toEqual([0, 1, 2, 10, 11, 12, 20, 21, 22]);
    expect([...log.sourceLine]).toEqual([2, 3, 4, 6, 7, 8, 10, 11, 12]);
    expect(fileParts).toEqual([
      { file: 1, records: 3, linesBefore: 0 },
      { file: 2, records: 3, linesBefore: 4 },
      { file: 0, records: 3, linesBefore: 8 },
    ]);
    expect(notes.map(({ code, count }) => [code, count])).toEqual([["parts-joined", 3]]);
  });

  it("are the same log as the uncut file", async () => {
    const { log } = createFixtureLog();
    const whole = writeWideCsv(log);
    const [head = "", ...lines] = whole.trimEnd().split("\n");
    const cut = [lines.slice(0, 100), lines.slice(100, 130), lines.slice(130)].map((some) =>
      [head, ...some].join("\n"),
    );
    const sources = [
      textSource(cut[1] ?? "", "2.csv"),
      bytesSource("3.csv.gz", gzipSync(new TextEncoder().encode(cut[2]))),
      textSource(cut[0] ?? "", "1.csv"),
    ];
    const inspected = await inspectParts(sources);
    if (!inspected.ok) throw new Error(inspected.error.message);
    const joined = await mustReadParts(sources, proposeMapping(inspected.value).mapping);
    const once = await readAsProposed(textSource(whole));
    expect(joined.log.timeMs).toEqual(once.log.timeMs);
    expect(joined.log.working).toEqual(once.log.working);
    expect(joined.log.channels.map(({ id, values }) => [id, values])).toEqual(
      once.log.channels.map(({ id, values }) => [id, values]),
    );
    expect(keepFirstRecords(joined.log, 1).longitude[0]).toBe(once.log.longitude[0]);
  });

  it("count the same bytes once, and say so", async () => {
    const { log, notes } = await mustReadParts([part("a.csv", 0), part("copy of a.csv", 0), part("b.csv", 10)], CLOCK);
    expect(log.records).toBe(6);
    expect(notes.map(({ code }) => code)).toEqual(["parts-joined", "parts-repeated"]);
    expect(notes[1]?.message).toContain("copy of a.csv");
  });

  it("say when one begins before another ends", async () => {
    const { notes } = await mustReadParts([part("a.csv", 0, 20), part("b.csv", 10, 20)], CLOCK);
    expect(notes.map(({ code }) => code)).toContain("parts-overlap");
  });

  it("stay in the order given where each counts time from its own start", async () => {
    const { notes } = await mustReadParts([part("b.csv", 10), part("a.csv", 0)], SIMPLE_MAPPING);
    expect(notes.map(({ code }) => code)).toContain("parts-as-given");
  });

  it("are refused with the name of the part that has other columns or cannot be read", async () => {
    const other = textSource("t_s,lon,lat,depth_mm\n1,-98.6,38.4,50\n", "other.csv");
    const outcome = await inspectParts([part("a.csv", 0), other]);
    expect(outcome).toMatchObject({ ok: false, error: { code: "mapping-mismatch" } });
    expect(!outcome.ok && outcome.error.message).toContain('"other.csv"');
    const broken = await readParts([part("a.csv", 0), other], CLOCK);
    expect(!broken.ok && broken.error.message).toContain("other.csv");
    expect(await readParts([], CLOCK)).toMatchObject({ ok: false, error: { code: "empty-file" } });
    expect(await inspectParts([])).toMatchObject({ ok: false, error: { code: "empty-file" } });
  });
});
