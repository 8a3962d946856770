import { gzipSync, zipSync } from "fflate";
import { describe, expect, it } from "vitest";
import { END_BYTES, proposeGrouping, type FileEnds } from "@/lib/ingest/propose-grouping";
import { writeWideCsv } from "@/lib/simulator/writers/write-csv";
import { createFixtureLog } from "@/tests/support/fixture-logs";

const [header = "", ...lines] = writeWideCsv(createFixtureLog().log).trimEnd().split("\n");
const encode = (text: string) => new TextEncoder().encode(text);
const part = (from: number, to?: number) => `${[header, ...lines.slice(from, to)].join("\n")}\n`;

function ends(name: string, bytes: Uint8Array, limits: { head: number; tail: number } = END_BYTES): FileEnds {
  const rest = Math.max(limits.head, bytes.length - limits.tail);
  return { name, head: bytes.subarray(0, limits.head), tail: bytes.subarray(rest) };
}

const propose = (...files: [string, string | Uint8Array][]) =>
  proposeGrouping(files.map(([name, bytes]) => ends(name, typeof bytes === "string" ? encode(bytes) : bytes)));

/** The same log so many hours later. */
const later = (hours: number) => {
  const log = createFixtureLog().log;
  return writeWideCsv({ ...log, timeMs: log.timeMs.map((ms) => ms + hours * 3_600_000) });
};

describe("files chosen at once", () => {
  it("are one log where they have the same columns and follow each other, in any order", async () => {
    const found = await propose(["c.csv", part(130)], ["a.csv", part(0, 100)], ["b.csv", part(100, 130)]);
    expect(found).toMatchObject({ together: true, order: [1, 2, 0] });
    expect(found.reason).toMatch(/same columns and follow each other, \d+ s apart at most/);
  });

  it("are told so from their ends alone, however much lies between", async () => {
    const limits = { head: 4_000, tail: 2_000 };
    const [first, second] = [encode(part(0, 130)), encode(part(130))];
    expect(first.length).toBeGreaterThan(2 * (limits.head + limits.tail));
    expect(await proposeGrouping([ends("b.csv", second, limits), ends("a.csv", first, limits)])).toMatchObject({
      together: true,
    });
  });

  it("are logs of their own where they were logged at once, hours apart, or with other columns", async () => {
    const whole = writeWideCsv(createFixtureLog().log);
    expect(await propose(["a.csv", whole], ["b.csv", later(0.01)])).toMatchObject({
      together: false,
      reason: expect.stringContaining("at the same time"),
    });
    expect(await propose(["a.csv", whole], ["b.csv", later(20)])).toMatchObject({
      together: false,
      order: [0, 1],
      reason: expect.stringMatching(/up to (19|20) h apart/),
    });
    const other = part(130).replace(header, header.replace("Margin", "Rest"));
    expect(
      (await propose(["a.csv", part(0, 130)], ["b.csv", other.replace(/^[^\n]+/, `${header},more`)])).together,
    ).toBe(false);
  });

  it("are logs of their own where nothing can be seen of them, and never an error", async () => {
    const whole = encode(part(0));
    for (const hidden of [gzipSync(whole), zipSync({ "a.csv": whole }), encode(""), new Uint8Array(900)]) {
      expect((await propose(["a.csv", whole], ["b", hidden])).together).toBe(false);
    }
  });
});
