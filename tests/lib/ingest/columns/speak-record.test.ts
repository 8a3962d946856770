import { describe, expect, it } from "vitest";
import type { ColumnMeaning } from "@/lib/ingest/columns/describe-column";
import { speakRecord, type SpokenCell } from "@/lib/ingest/columns/speak-record";
import { formatQuantity } from "@/lib/units/format-quantity";
import { mustInspect, textSource } from "@/tests/lib/ingest/support/make-source";

const say = (valueSi: number, unit: string, channel: string) =>
  formatQuantity(valueSi, unit, "metric", { channel }).text.replaceAll("\u202f", " ");
const as = (cell: string, channel: ColumnMeaning["channel"], unit: ColumnMeaning["unit"], more = {}): SpokenCell => ({
  cell,
  meaning: { channel, unit, ...more },
});

describe("one record, read out", () => {
  it("says time, place, motion and what one row did", () => {
    const cells = [
      as("2026-09-24T14:05:00Z", "time", "iso8601"),
      as("-98.61", "longitude", "deg"),
      as("38.41", "latitude", "deg"),
      as("92", "heading", "deg"),
      as("4.66", "speed", "mph"),
      as("1", "working", "boolean"),
      as("200", "downforce", "lbf", { row: 1 }),
      as("212", "downforce", "lbf", { row: 2 }),
      as("67", "margin", "lbf", { row: 2 }),
      as("2", "depth", "in", { row: 2 }),
      as("98", "contact", "percent", { row: 2 }),
    ];
    // 212 lbf = 943.0 N, 67 lbf = 298.0 N, 2 in = 50.8 mm, 4.66 mph = 7.50 km/h (factors of NIST SP 811).
    expect(speakRecord(cells, { say })).toBe(
      "At 2026-09-24T14:05:00Z, at 38.41000° north, 98.61000° west, heading 92°, at 7.5 km/h, working: " +
        "row 2 was pressed down with 943 N, left 298 N on its gauge wheel, ran 51 mm deep and had ground contact of 98 %.",
    );
  });

  it("follows the meanings: a swapped place, lost contact, a comma, what counts as missing", () => {
    const swapped = [as("-98.61", "latitude", "deg"), as("38.41", "longitude", "deg")];
    expect(speakRecord(swapped, { say })).toBe("At 98.61000° south, 38.41000° east.");
    expect(speakRecord([as("2", "contact", "percent", { format: "lost" })], { say })).toBe(
      "The machine had ground contact of 98 %.",
    );
    expect(speakRecord([as("50,8", "depth", "mm")], { say, decimalComma: true })).toBe("The machine ran 51 mm deep.");
    expect(speakRecord([as("-999", "depth", "mm", { missing: [-999] })], { say })).toBeNull();
    expect(speakRecord([as("212", "downforce", null)], { say })).toBeNull();
  });

  it("says which clock a time is by", () => {
    const local = as("24/09/2026 09:05", "time", "local", { format: "dd/MM/yyyy HH:mm" });
    expect(speakRecord([local], { say, timeZone: "America/Chicago" })).toBe(
      "On 24/09/2026 09:05 by the clock of America/Chicago.",
    );
    expect(speakRecord([local], { say })).toBe("On 24/09/2026 09:05 by the clock of a zone still to be named.");
    expect(speakRecord([as("2026-09-24T09:05:00", "time", "iso8601")], { say })).toBe(
      "At 2026-09-24T09:05:00 by the clock of UTC.",
    );
    // 1,790,258,700 s after 1970 began (GNU date -u -d @1790258700).
    expect(speakRecord([as("1790258700", "time", "unix-s")], { say })).toBe("At 2026-09-24 14:05:00 UTC.");
    expect(speakRecord([as("1500", "time", "ms")], { say })).toBe("1.5 s from the start of the log.");
  });

  it("is a whole record of the file, the first that lacks fewest cells", async () => {
    const lines = ["1,-98.61,38.41,,950", "2,-98.62,38.42,901,951", "3,-98.63,38.43,902,952"];
    const { example } = await mustInspect(textSource(`t_s,lon,lat,DF_1_N,DF_2_N\n${lines.join("\n")}\n`));
    expect(example).toEqual(["2", "-98.62", "38.42", "901", "951"]);
  });
});
