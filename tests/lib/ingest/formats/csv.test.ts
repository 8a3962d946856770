import fc from "fast-check";
import { gzipSync } from "fflate";
import { describe, expect, it } from "vitest";
import { bytesSource, type ByteSource } from "@/lib/ingest/byte-source";
import { parseCsvText } from "@/lib/ingest/formats/csv/parse-csv-text";
import { readLog } from "@/lib/ingest";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { MachineLog } from "@/lib/logs/machine-log";
import {
  mustInspect,
  mustRead,
  readAsProposed,
  SIMPLE_HEADER,
  SIMPLE_MAPPING,
  textSource,
  utf16,
} from "@/tests/lib/ingest/support/make-source";

const LINES = ["0,-98.6125,38.4171,200,210.5", "1,-98.6124,38.4172,,-211", "2,-98.6123,38.4173,1e2,abc"];
const TEXT = `${SIMPLE_HEADER}\n${LINES.join("\n")}\n`;

function valuesOf(log: MachineLog, id = "downforce"): number[] {
  const channel = log.channels.find((candidate) => candidate.id === id);
  return [...(channel?.values ?? [])];
}

const LBF = 4.4482216152605;
const FORCES = [200, 210.5, NaN, -211, 100, NaN].map((value) => Math.fround(value * LBF));

describe("RFC 4180", () => {
  it("keeps quoted separators, doubled quotes and line breaks", () => {
    // Rows as Python 3.11 `csv.reader` gives them for these bytes.
    const text = 'plot,note,yield\r\n1,"wet, east end",201.5\r\n2,"said ""skip""",\r\n3,"two\r\nlines",198\r\n';
    const { rows } = parseCsvText(text, { delimiter: ",", newline: "\n", isLast: true });
    expect(rows.filter((row) => row.length > 1)).toEqual([
      ["plot", "note", "yield"],
      ["1", "wet, east end", "201.5"],
      ["2", 'said "skip"', ""],
      ["3", "two\r\nlines", "198"],
    ]);
  });

  it("counts lines of the file, not rows, in messages", async () => {
    const text = `note,${SIMPLE_HEADER}\r\n"two\r\nlines",0,-98.6,38.4,200,210\r\n"a ""b""",1,-98.6,98.4,200,210\r\n`;
    const outcome = await readLog(textSource(text), SIMPLE_MAPPING);
    expect(outcome).toMatchObject({ ok: false, error: { code: "latitude-out-of-range", line: 4, column: "lat" } });
  });
});

describe("wide files", () => {
  it("reads numbers into SI, row by row, with what was missing", async () => {
    const { log, notes } = await mustRead(textSource(TEXT), SIMPLE_MAPPING);
    expect(log).toMatchObject({
      kind: "seeding",
      records: 3,
      rows: 2,
      timeIsRelative: true,
      working: null,
      loggedPass: null,
    });
    expect([...log.timeMs]).toEqual([0, 1000, 2000]);
    expect([...log.longitude]).toEqual([-98.6125, -98.6124, -98.6123]);
    expect([...log.sourceLine]).toEqual([2, 3, 4]);
    expect(valuesOf(log)).toEqual(FORCES);
    expect(log.channels[0]).toMatchObject({ unit: "N", rows: 2, perRow: true });
    expect(notes).toMatchObject([{ code: "unreadable-value", count: 1, firstLine: 4 }]);
    expect(notes[0]?.message).toContain("DF_2");
  });

  const written: [string, ByteSource][] = [
    ["CRLF, no line end at the end", textSource(TEXT.replaceAll("\n", "\r\n").trimEnd())],
    ["byte-order mark", textSource(`\uFEFF${TEXT}`)],
    ["UTF-16 little-endian", bytesSource("a.csv", utf16(TEXT))],
    ["UTF-16 big-endian", bytesSource("a.csv", utf16(TEXT, true))],
    ["tabs", textSource(TEXT.replaceAll(",", "\t"), "log.tsv")],
    ["semicolons", textSource(TEXT.replaceAll(",", ";"))],
    ["bars", textSource(TEXT.replaceAll(",", "|"))],
    ["decimal commas", textSource(TEXT.replaceAll(",", ";").replaceAll(".", ","))],
    ["quoted decimal commas", textSource(TEXT.replace(/(-?\d+)\.(\d+)/g, '"$1,$2"'))],
    ["every cell quoted", textSource(TEXT.replace(/[^,\n]+/g, '"$&"'))],
    ["only the header quoted", textSource(TEXT.replace(SIMPLE_HEADER, '"t","lon","lat","DF_1","DF_2"'))],
    ["lone carriage returns", textSource(TEXT.replaceAll("\n", "\r"))],
    ["gzip", bytesSource("log.csv.gz", gzipSync(new TextEncoder().encode(TEXT)))],
    [
      "a delimiter at every line's end",
      textSource(LINES.reduce((text, line) => `${text}${line},\n`, `${SIMPLE_HEADER}\n`)),
    ],
  ];
  it.each(written)("%s reads the same", async (_, source) => {
    const { log } = await mustRead(source, SIMPLE_MAPPING);
    expect(valuesOf(log)).toEqual(FORCES);
    expect([...log.latitude]).toEqual([38.4171, 38.4172, 38.4173]);
  });

  it("passes over remarks, a units line and blank lines, and keeps the line numbers", async () => {
    const text = `# Larkspur Flats\n# drilled in autumn\n\nt,lon,lat,DF_1,DF_2\ns,deg,deg,lbf,lbf\n${LINES[0]}\n\n${LINES[1]}\n`;
    const inspection = await mustInspect(textSource(text));
    expect(inspection.columns.map((column) => column.proposal?.unit)).toEqual(["s", "deg", "deg", "lbf", "lbf"]);
    expect(inspection.notes.map((note) => note.code)).toEqual(["lines-before-header", "units-row"]);
    const { log } = await readAsProposed(textSource(text));
    expect([...log.sourceLine]).toEqual([6, 8]);
  });

  it("names columns without a header, and headers that repeat", async () => {
    const bare = await mustInspect(textSource("1,2,3\n4,5,6\n"));
    expect(bare.columns.map((column) => column.name)).toEqual(["column 1", "column 2", "column 3"]);
    expect(bare.notes.map((note) => note.code)).toContain("no-header");
    const twice = await mustInspect(textSource("speed,speed,\n1,2,3\n"));
    expect(twice.columns.map((column) => column.name)).toEqual(["speed", "speed (2)", "column 3"]);
  });

  it("reads Windows-1252 headers", async () => {
    const bytes = Uint8Array.from(
      [...`heading \u00b0,lon,lat,DF_1\n${"90,-98.6,38.4,5\n".repeat(3)}`].map((c) => c.charCodeAt(0)),
    );
    const inspection = await mustInspect(bytesSource("a.csv", bytes));
    expect(inspection.encoding).toBe("windows-1252");
    expect(inspection.columns[0]).toMatchObject({ name: "heading °", proposal: { channel: "heading", unit: "deg" } });
  });

  it("leaves a gap in the rows empty and counts rows to the last", async () => {
    const columns = SIMPLE_MAPPING.columns.map((column) => (column.row === 2 ? { ...column, row: 4 } : column));
    const { log } = await mustRead(textSource(TEXT), { ...SIMPLE_MAPPING, columns });
    expect(log.rows).toBe(4);
    expect(valuesOf(log).slice(0, 4)).toEqual([FORCES[0], NaN, NaN, FORCES[1]]);
  });
});

describe("a file of thousands of columns", () => {
  const names = Array.from({ length: 1000 }, (_, i) => `DF_${i + 1}_N`);
  const others = Array.from({ length: 4000 }, (_, i) => `AUX ${i}`);
  const header = ["t_s", "lon", "lat", ...names, ...others].join(",");
  const line = (i: number) =>
    [
      i,
      (-98.61 + i / 1e5).toFixed(5),
      38.41,
      ...names.map((_, k) => 500 + ((i * 7 + k) % 300)),
      ...others.map(() => 1),
    ].join(",");
  const text = `${header}\n${Array.from({ length: 120 }, (_, i) => line(i)).join("\n")}\n`;

  it("is inspected with every column and read whole", async () => {
    const inspection = await mustInspect(textSource(text));
    expect(inspection.columns).toHaveLength(5003);
    expect(inspection).toMatchObject({ shape: "wide" });
    expect(inspection.example).toHaveLength(5003);
    expect(inspection.columns[1002]?.proposal).toMatchObject({ channel: "downforce", row: 1000, unit: "N" });
    const { log } = await readAsProposed(textSource(text));
    expect([log.records, log.rows]).toEqual([120, 1000]);
    expect(log.channels[0]?.values[119 * 1000 + 999]).toBe(500 + ((119 * 7 + 999) % 300));
  });
});

describe("notes on what was left out or looks odd", () => {
  it("rejects ragged lines with their place", async () => {
    const { log, notes } = await mustRead(
      textSource(`${TEXT}9,8,7\n3,-98.6,38.4,1,2,3\n4,-98.6,38.4,1,2\n`),
      SIMPLE_MAPPING,
    );
    expect(log.records).toBe(4);
    expect(notes.find((note) => note.code === "ragged-rows")).toMatchObject({ count: 2, firstLine: 5 });
  });

  it.each([
    ["LF", (text: string) => text],
    ["CRLF", (text: string) => text.replaceAll("\n", "\r\n")],
    ["CR, which the general reader takes", (text: string) => text.replaceAll("\n", "\r")],
  ])("says once that a file ends in the middle of its last line (%s)", async (_lineEnd, change) => {
    const cut = await mustRead(textSource(change(`${TEXT}3,-98.6,38.4`)), SIMPLE_MAPPING);
    expect(cut.log.records).toBe(3);
    expect(cut.notes.filter(({ code }) => /cut-short|ragged/.test(code))).toEqual([
      {
        code: "cut-short",
        count: 1,
        firstLine: 5,
        message: "The file ends in the middle of line 5: it may be cut off; the last whole record is line 4.",
      },
    ]);
    // A ragged line before it keeps its own note; with a line end, or with all fields, nothing was cut.
    const both = await mustRead(textSource(change(`${TEXT}9,8,7\n3,-98.6,38.4`)), SIMPLE_MAPPING);
    expect(both.notes.find(({ code }) => code === "ragged-rows")).toMatchObject({ count: 1, firstLine: 5 });
    expect(both.notes.find(({ code }) => code === "cut-short")?.message).toContain("last whole record is line 4.");
    for (const end of ["3,-98.6,38.4\n", "3,-98.6,38.4,1,2", "3,-98.6,38.4,1,2,3"]) {
      const { notes } = await mustRead(textSource(change(TEXT + end)), SIMPLE_MAPPING);
      expect(notes.map(({ code }) => code)).not.toContain("cut-short");
    }
  });

  it("marks positions at 0,0, missing positions, doubled and backward times", async () => {
    const text = `${SIMPLE_HEADER}\n0,0,0,1,2\n1,-98.6,,1,2\n1,-98.6,38.4,1,2\n0.5,-98.6,38.4,1,2\n0.7,-98.6,38.4,1,2\n`;
    const { log, notes } = await mustRead(textSource(text), SIMPLE_MAPPING);
    expect([...log.longitude]).toEqual([NaN, NaN, -98.6, -98.6, -98.6]);
    expect(notes.map(({ code, count, firstLine }) => [code, count, firstLine])).toEqual([
      ["zero-position", 1, 2],
      ["no-position", 1, 3],
      ["duplicate-times", 1, 4],
      ["out-of-order", 2, 5],
    ]);
    expect([...log.timeMs]).toEqual([0, 1000, 1000, 500, 700]);
  });
});

describe("a file that holds one value for all rows", () => {
  const lines = (second: (i: number) => number) =>
    `${SIMPLE_HEADER}\n${Array.from({ length: 40 }, (_, i) => `${i},-98.6,38.4,${200 + i},${second(i)}`).join("\n")}\n`;
  const codes = async (text: string) =>
    (await mustRead(textSource(text), SIMPLE_MAPPING)).notes.map((note) => note.code);

  it("is told apart from one where rows differ once", async () => {
    expect(await codes(lines((i) => 200 + i))).toEqual(["row-averaged"]);
    expect(await codes(lines((i) => (i === 17 ? 3 : 200 + i)))).toEqual([]);
  });
});

describe("times, places and states", () => {
  const place: LogMapping["columns"] = [
    { name: "lon", channel: "longitude", unit: "deg" },
    { name: "lat", channel: "latitude", unit: "deg" },
  ];
  const read = (header: string, cells: string, columns: LogMapping["columns"], rest: Partial<LogMapping> = {}) =>
    mustRead(textSource(`lon,lat,${header}\n-98.6,38.4,${cells}\n-98.6,38.4,${cells}\n`), {
      shape: "single",
      columns: [...place, ...columns],
      ...rest,
    });

  it.each([
    ["iso8601", "2026-05-03T14:22:01.5Z", {}],
    ["iso8601", "2026-05-03T09:22:01.5-05:00", {}],
    ["iso8601", "2026-05-03T09:22:01.5", { timeZone: "America/Chicago" }],
    ["unix-s", "1777818121.5", {}],
    ["unix-ms", "1777818121500", {}],
    ["gps-s", "1461853339.5", {}],
  ] as const)("%s %s", async (unit, cell, rest) => {
    const { log } = await read("t", cell, [{ name: "t", channel: "time", unit }], rest);
    expect(new Date(log.timeMs[0] ?? NaN).toISOString()).toBe("2026-05-03T14:22:01.500Z");
    expect(log.timeIsRelative).toBe(false);
  });

  it("joins a local date and a local time", async () => {
    const columns: LogMapping["columns"] = [
      { name: "date", channel: "time", unit: "local", format: "dd/MM/yyyy" },
      { name: "clock", channel: "time", unit: "local", format: "HH:mm:ss" },
    ];
    const { log } = await read("date,clock", "03/05/2026,09:22:01", columns, { timeZone: "America/Chicago" });
    expect(new Date(log.timeMs[0] ?? NaN).toISOString()).toBe("2026-05-03T14:22:01.000Z");
  });

  it("says so when a time names no offset", async () => {
    const { notes } = await read("t", "2026-05-03T14:22:01", [{ name: "t", channel: "time", unit: "iso8601" }]);
    expect(notes.map((note) => note.code)).toContain("time-without-zone");
  });

  it("turns easting and northing into degrees", async () => {
    // PROJ 9: `echo "40 -100" | cs2cs EPSG:4326 EPSG:32614`.
    const text = "e,n,DF\n414639.538157,4428236.064633,5\n414639.538157,4428236.064633,5\n";
    const { log } = await mustRead(textSource(text), {
      shape: "single",
      crs: "EPSG:32614",
      columns: [
        { name: "e", channel: "easting", unit: "m" },
        { name: "n", channel: "northing", unit: "m" },
        { name: "DF", channel: "other:force", unit: "N" },
      ],
    });
    expect(log.longitude[0]).toBeCloseTo(-100, 8);
    expect(log.latitude[0]).toBeCloseTo(40, 8);
    expect(log.kind).toBe("other");
  });

  it("keeps working states, passes, headings and speeds", async () => {
    const { log } = await read("w,p,h,v", "yes,7,-90,36", [
      { name: "w", channel: "working", unit: "boolean" },
      { name: "p", channel: "pass", unit: "1" },
      { name: "h", channel: "heading", unit: "deg" },
      { name: "v", channel: "speed", unit: "km/h" },
    ]);
    expect([log.working?.[0], log.loggedPass?.[0], log.headingDeg?.[0], log.speedMps?.[0]]).toEqual([1, 7, 270, 10]);
  });

  it("keeps a pressure in pascals, with a note", async () => {
    const { log, notes } = await read("p", "100", [{ name: "p", channel: "downforce", unit: "psi" }]);
    // 1 psi is 6894.75729316836 Pa (GNU units 2.22).
    expect(log.channels[0]).toMatchObject({ id: "downforce", unit: "Pa", perRow: false });
    expect(log.channels[0]?.values[0]).toBe(Math.fround(689475.729316836));
    expect(notes.map((note) => note.code)).toEqual(["pressure-not-force"]);
  });

  it("reads bushels by their weight", async () => {
    const { log } = await read("y", "100", [{ name: "y", channel: "yieldMass", unit: "bu/ac", format: "60 lb" }]);
    // 67.2510693716674 kg/ha to the bushel of 60 lb (GNU units 2.22).
    expect(log.channels[0]?.values[0]).toBeCloseTo(0.672510693716674, 6);
    expect(log.kind).toBe("harvest");
  });
});

describe("long files", () => {
  const mapping: LogMapping = {
    shape: "long",
    columns: [
      { name: "t", channel: "time", unit: "s" },
      { name: "lon", channel: "longitude", unit: "deg" },
      { name: "lat", channel: "latitude", unit: "deg" },
      { name: "v", channel: "speed", unit: "m/s" },
      { name: "row", channel: "row", unit: "1" },
      { name: "m", channel: "margin", unit: "N" },
    ],
  };
  const HEADER = "t,lon,lat,v,row,m";

  it("groups the lines of a record, whatever the order of its rows, and leaves gaps empty", async () => {
    const text = `${HEADER}\n0,-98.6,38.4,2,1,10\n0,-98.6,38.4,2,3,30\n1,-98.6,38.5,2,2,21\n1,-98.6,38.5,2,1,11\n1,-98.6,38.5,2,3,\n`;
    const { log } = await mustRead(textSource(text), mapping);
    expect(log).toMatchObject({ records: 2, rows: 3 });
    expect(valuesOf(log, "margin")).toEqual([10, NaN, 30, 11, 21, NaN]);
    expect([...log.sourceLine]).toEqual([2, 4]);
    expect([...(log.speedMps ?? [])]).toEqual([2, 2]);
  });

  it("begins a new record when a row comes again at the same time and place", async () => {
    const text = `${HEADER}\n0,-98.6,38.4,0,1,1\n0,-98.6,38.4,0,2,2\n0,-98.6,38.4,0,1,3\n0,-98.6,38.4,0,2,4\n`;
    const { log } = await mustRead(textSource(text), mapping);
    expect(valuesOf(log, "margin")).toEqual([1, 2, 3, 4]);
    expect(log.records).toBe(2);
  });

  it("takes rows from 0 only when told", async () => {
    const text = `${HEADER}\n0,-98.6,38.4,2,0,10\n0,-98.6,38.4,2,1,20\n1,-98.6,38.5,2,0,11\n1,-98.6,38.5,2,1,21\n1,-98.6,38.5,2,x,9\n`;
    const fromZero = mapping.columns.map((column) =>
      column.name === "row" ? { ...column, format: "from 0" } : column,
    );
    const { log, notes } = await mustRead(textSource(text), { ...mapping, columns: fromZero });
    expect(valuesOf(log, "margin")).toEqual([10, 20, 11, 21]);
    expect(notes.map((note) => note.code)).toContain("bad-row-number");
    const wrong = await readLog(textSource(text), mapping);
    expect(wrong).toMatchObject({ ok: false, error: { code: "missing-row", column: "row", line: 2 } });
  });

  it("puts the lines of a record together in a file sorted by row, and says so", async () => {
    const text = `${HEADER}\n0,-98.6,38.4,2,1,10\n1,-98.6,38.5,2,1,11\n0,-98.6,38.4,2,2,20\n1,-98.6,38.5,2,2,21\n`;
    const { log, notes } = await mustRead(textSource(text), mapping);
    expect(valuesOf(log, "margin")).toEqual([10, 20, 11, 21]);
    expect([...log.timeMs]).toEqual([0, 1000]);
    expect([...log.sourceLine]).toEqual([2, 3]);
    expect(notes).toMatchObject([{ code: "regrouped", count: 2 }]);
  });

  it("puts lines in any order into the same log as the sorted file", async () => {
    const lines = Array.from({ length: 60 }, (_, i) => {
      const [record, row] = [Math.floor(i / 3), (i % 3) + 1];
      return `${record},-98.6,${38.4 + record / 1e4},2,${row},${record * 10 + row}`;
    });
    const sorted = await mustRead(textSource(`${HEADER}\n${lines.join("\n")}\n`), mapping);
    // Steps of 7 visit all 60 lines, since 7 and 60 share no factor.
    const mixed = lines.map((_, i) => lines[(i * 7) % 60]);
    const { log, notes } = await mustRead(textSource(`${HEADER}\n${mixed.join("\n")}\n`), mapping);
    expect(valuesOf(log, "margin")).toEqual(valuesOf(sorted.log, "margin"));
    expect([...log.timeMs]).toEqual([...sorted.log.timeMs]);
    expect(notes.map((note) => note.code)).toEqual(["regrouped"]);
    expect(sorted.notes).toEqual([]);
  });

  it("keeps two records of the same row at the same time and place apart", async () => {
    const text = `${HEADER}\n0,-98.6,38.4,2,1,10\n0,-98.6,38.4,2,1,11\n0,-98.6,38.4,2,2,20\n0,-98.6,38.4,2,2,21\n`;
    const { log } = await mustRead(textSource(text), mapping);
    expect(log.records).toBe(2);
    const values = valuesOf(log, "margin");
    expect([values[0], values[2]].sort()).toEqual([10, 11]);
    expect([values[1], values[3]].sort()).toEqual([20, 21]);
  });

  it("stops when no two lines share a record", async () => {
    const text = `${HEADER}\n0,-98.6,38.4,2,1,10\n1,-98.6,38.5,2,2,11\n2,-98.6,38.6,2,1,20\n3,-98.6,38.7,2,2,21\n`;
    expect(await readLog(textSource(text), mapping)).toMatchObject({
      ok: false,
      error: { code: "records-not-together" },
    });
  });

  it("grows past its first guess of records and rows", async () => {
    const lines = Array.from({ length: 3000 * 5 }, (_, i) => {
      const record = Math.floor(i / 5);
      return `${record},-98.6,${(38 + record * 1e-5).toFixed(5)},2,${(i % 5) + 1},${i}`;
    });
    const { log } = await mustRead(textSource(`${HEADER}\n${lines.join("\n")}\n`), mapping);
    expect(log).toMatchObject({ records: 3000, rows: 5 });
    expect(valuesOf(log, "margin")).toEqual(Array.from({ length: 15_000 }, (_, i) => i));
  });
});

const cell = fc.oneof(
  fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e6, max: 1e6 }).map((value) => value.toFixed(3)),
  fc.integer({ min: -99_999, max: 99_999 }).map(String),
  fc.constantFrom(
    "",
    " ",
    "NA",
    "x",
    "1e3",
    "-.5",
    "7.",
    "+4",
    "1,2".replace(",", "_"),
    "123456789012345678",
    "\u00b5",
  ),
);
const body = fc.array(fc.tuple(cell, cell), { minLength: 1, maxLength: 30 });

/** The same table plain, with cells in quotes, and with quotes that only the general reader takes (doubled) in every line. */
function asTexts(rows: [string, string][], lineEnd: string): { plain: string; quoted: string; general: string } {
  const build = (quote: string, note: string) =>
    [`${SIMPLE_HEADER},note`, ...rows.map(([a, b], i) => `${i},-98.6,38.4,${a},${quote}${b}${quote},${note}`), ""].join(
      lineEnd,
    );
  return { plain: build("", "n"), quoted: build('"', '"n"'), general: build('"', '"a ""b"" c"') };
}

describe("the fast reader and the general reader", () => {
  it("agree on every table", async () => {
    await fc.assert(
      fc.asyncProperty(body, fc.constantFrom("\n", "\r\n"), async (rows, lineEnd) => {
        const { plain, quoted, general } = asTexts(rows, lineEnd);
        const outcome = await readLog(textSource(plain), SIMPLE_MAPPING);
        expect(await readLog(textSource(general), SIMPLE_MAPPING)).toEqual(outcome);
        expect(await readLog(textSource(quoted), SIMPLE_MAPPING)).toEqual(outcome);
      }),
      { numRuns: 150 },
    );
  });

  it("give the same log however the bytes are cut into chunks", async () => {
    const way = fc.constantFrom("plain" as const, "quoted" as const, "general" as const);
    await fc.assert(
      fc.asyncProperty(body, fc.integer({ min: 1, max: 40 }), way, async (rows, chunkBytes, how) => {
        const text = asTexts(rows, "\r\n")[how];
        const whole = await readLog(textSource(text), SIMPLE_MAPPING);
        expect(await readLog(textSource(text, "log.csv", chunkBytes), SIMPLE_MAPPING)).toEqual(whole);
      }),
      { numRuns: 200 },
    );
  });

  it("agree on quotes around separators, quotes and line breaks, wherever they stand", async () => {
    const note = fc.constantFrom("", "n", '"a,b"', '"a ""b"""', '"two\nlines"', '"x" ', '5"', '""', '"7"');
    await fc.assert(
      fc.asyncProperty(fc.array(note, { minLength: 1, maxLength: 12 }), async (notes) => {
        const lines = notes.map((text, i) => `${text},${i},-98.6,38.4,${i},${i * 2}`);
        const first = (text: string) => [`note,${SIMPLE_HEADER}`, `${text},0,-98.6,38.4,1,2`, ...lines].join("\n");
        // A doubled quote in the first line sends the whole file to the general reader.
        const general = await readLog(textSource(first('"a ""b"""')), SIMPLE_MAPPING);
        expect(await readLog(textSource(first("n")), SIMPLE_MAPPING)).toEqual(general);
      }),
      { numRuns: 200 },
    );
  });

  it("hand over when the first hard quote comes late", async () => {
    const lines = Array.from(
      { length: 3000 },
      (_, i) => `${i},-98.6,38.4,${i},5,${i === 2990 ? '"two\nlines"' : "one"}`,
    );
    const text = `${SIMPLE_HEADER},note\n${lines.join("\n")}\n`;
    const { log } = await mustRead(textSource(text), SIMPLE_MAPPING);
    expect(log.records).toBe(3000);
    expect([...log.sourceLine.subarray(2989, 2993)]).toEqual([2991, 2992, 2994, 2995]);
  });
});

describe("files put together from parts", () => {
  const head = "t,lon,lat,DF_1,DF_2";
  const part = (from: number) =>
    Array.from({ length: 3 }, (_, i) => `${from + i},-98.6,38.4,2${from + i},21`).join("\n");
  const files: [string, string][] = [
    ["plain", `${head}\n${part(0)}\n${head}\n${part(3)}\n`],
    ["with CRLF", `${head}\n${part(0)}\n${head}\n${part(3)}\n`.replaceAll("\n", "\r\n")],
    [
      "read by the general reader",
      `${head}\n${part(0)}\n${head}\n${part(3)}\n`.replaceAll(",", ";").replaceAll(".", ","),
    ],
    ["with a line of units", `${head}\ns,deg,deg,lbf,lbf\n${part(0)}\n${head}\ns,deg,deg,lbf,lbf\n${part(3)}\n`],
  ];
  it.each(files)("%s: leave the headers within out, with a note", async (_, text) => {
    for (const chunkBytes of [11, 1 << 16]) {
      const { log, notes } = await mustRead(textSource(text, "log.csv", chunkBytes), SIMPLE_MAPPING);
      expect([...log.timeMs]).toEqual([0, 1000, 2000, 3000, 4000, 5000]);
      expect(notes.map(({ code }) => code)).toEqual(["repeated-header"]);
    }
  });
});

describe("thousands of columns", () => {
  it("are read as quickly sized arrays, each in its row", async () => {
    const rows = 1000;
    const channels = ["DF", "MG", "DP", "POP", "GC"];
    const units = ["N", "N", "mm", "1/m2", "pct"];
    const names = channels.flatMap((channel, at) =>
      Array.from({ length: rows }, (_, i) => `${channel}_${i + 1}_${units[at]}`),
    );
    const line = (record: number) =>
      `${record},-98.6,${38.4 + record / 1e5},${names.map((_, i) => (i + record) % 100).join(",")}`;
    const text = `t_s,lon,lat,${names.join(",")}\n${Array.from({ length: 12 }, (_, record) => line(record)).join("\n")}\n`;
    const inspection = await mustInspect(textSource(text));
    expect(inspection.columns).toHaveLength(5003);
    const columns = names.map((name, i) => ({
      name,
      channel: (["downforce", "margin", "depth", "population", "contact"] as const)[Math.floor(i / rows)] ?? "depth",
      row: (i % rows) + 1,
      unit: (["N", "N", "mm", "1/m2", "percent"] as const)[Math.floor(i / rows)] ?? "mm",
    }));
    const { log } = await mustRead(textSource(text), {
      shape: "wide",
      columns: [
        { name: "t_s", channel: "time", unit: "s" },
        { name: "lon", channel: "longitude", unit: "deg" },
        { name: "lat", channel: "latitude", unit: "deg" },
        ...columns,
      ],
    });
    expect(log).toMatchObject({ records: 12, rows: 1000 });
    // Column 1000 + 499 of record 7: (1499 + 7) % 100.
    expect(log.channels.find(({ id }) => id === "margin")?.values[7 * 1000 + 499]).toBe(6);
  });
});
