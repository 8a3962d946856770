import { describe, expect, it } from "vitest";
import type { LogMapping } from "@/lib/ingest/mapping";
import { proposeMapping } from "@/lib/ingest/propose-mapping";
import { parseDegrees, readDegreesForm } from "@/lib/ingest/records/parse-degrees";
import {
  errorOf,
  mustInspect,
  mustRead,
  readAsProposed,
  SIMPLE_MAPPING,
  textSource,
} from "@/tests/lib/ingest/support/make-source";

const FIELD = { longitude: -98.61, latitude: 38.41 };
const rows = (count: number, line: (i: number) => string) =>
  Array.from({ length: count }, (_, i) => line(i)).join("\n");
const at = (i: number) => `${i},${(-98.61 - i * 1e-5).toFixed(5)},${(38.41 + i * 1e-5).toFixed(5)}`;
const table = (header: string, count: number, cells: (i: number) => string) =>
  textSource(`t_s,lon,lat,${header}\n${rows(count, (i) => `${at(i)},${cells(i)}`)}\n`);
const codesOf = ({ notes }: { notes: { code: string }[] }) => notes.map((note) => note.code);

describe("numbers that stand for nothing", () => {
  const force = (i: number) => (i % 5 === 0 ? -999 : 900 + i);
  const source = table("DF_1_N,DF_2_N", 40, (i) => `${force(i)},${i % 7 === 0 ? 65535 : 950 + i}`);

  it("are proposed as missing and said", async () => {
    const inspection = await mustInspect(source);
    expect(inspection.columns.slice(3).map(({ proposal }) => proposal?.missing)).toEqual([[-999], [65535]]);
    expect(inspection.notes.find(({ code }) => code === "sentinels-proposed")?.message).toContain("-999 of downforce");
    expect(inspection.columns[3]?.words).toContain("-999 counts as missing");
  });

  it("count as missing by the mapping, with a note; without it they stay", async () => {
    const { log, notes } = await readAsProposed(source);
    const values = [...(log.channels[0]?.values ?? [])];
    expect(values.slice(0, 4)).toEqual([NaN, NaN, 901, 951]);
    // 8 of -999 and 6 of 65535.
    expect(notes).toContainEqual(expect.objectContaining({ code: "sentinel-values", count: 14, firstLine: 2 }));
    const { mapping } = proposeMapping(await mustInspect(source));
    const kept = await mustRead(source, {
      ...mapping,
      columns: mapping.columns.map(({ missing: _, ...column }) => column),
    });
    expect([...(kept.log.channels[0]?.values ?? [])].slice(0, 2)).toEqual([-999, 65535]);
  });

  it.each([
    ["one alone", (i: number) => (i === 3 ? -999 : 900 + i)],
    ["a value among the others", (i: number) => (i % 4 === 0 ? 255 : 240 + i)],
    ["a number nobody writes for nothing", (i: number) => (i % 4 === 0 ? -777 : 900 + i)],
  ])("%s is left alone", async (_, cell) => {
    const inspection = await mustInspect(table("DF_1_N,DF_2_N", 40, (i) => `${cell(i)},${900 + i}`));
    expect(inspection.columns[3]?.proposal?.missing).toBeUndefined();
  });
});

describe("units that are easily mistaken", () => {
  it("newtons that look like kilograms are doubted", async () => {
    const inspection = await mustInspect(table("DF_1_N,DF_2_N", 40, (i) => `${90 + i},${95 + i}`));
    expect(codesOf(inspection)).toContain("newtons-like-kilograms");
    expect(inspection.columns[3]?.proposal?.confidence).toBeLessThan(0.7);
    const plain = await mustInspect(table("DF_1_N,DF_2_N", 40, (i) => `${900 + i},${950 + i}`));
    expect(codesOf(plain)).not.toContain("newtons-like-kilograms");
  });

  it("kilograms on a force are kilograms-force, to be looked at", async () => {
    const inspection = await mustInspect(table("Downforce row 1 (kg),Downforce row 2 (kg)", 40, (i) => `${90 + i},95`));
    expect(inspection.columns[3]?.proposal).toMatchObject({ channel: "downforce", unit: "kgf" });
    expect(inspection.columns[3]?.proposal?.confidence).toBeLessThan(0.7);
  });

  it("a force no opener can bear is doubted", async () => {
    const inspection = await mustInspect(table("DF_1_lbf,DF_2_lbf", 40, (i) => `${9000 + i},${9100 + i}`));
    expect(inspection.columns[3]?.proposal?.confidence).toBeLessThan(0.7);
  });

  it("a pressure is said to be one before anything is read", async () => {
    const inspection = await mustInspect(table("DF_1_psi,DF_2_psi", 40, (i) => `${300 + i},${310 + i}`));
    expect(codesOf(inspection)).toContain("pressure-proposed");
  });

  it("ground contact asks how it is defined, as a share or in per cent", async () => {
    const shares = await mustInspect(table("contact_1,contact_2", 40, (i) => `${0.9 + i / 1000},0.95`));
    expect(codesOf(shares)).toContain("contact-definition");
    expect(shares.columns[3]?.proposal?.unit).toBe("fraction");
    const percents = await mustInspect(table("contact_1,contact_2", 40, (i) => `${90 + i / 10},95`));
    expect(percents.columns[3]?.proposal?.unit).toBe("percent");
  });

  it("a channel that never changes is said", async () => {
    const { notes } = await readAsProposed(
      table("DF_1_N,DF_2_N,depth_1_mm,depth_2_mm", 60, (i) => `${900 + i},905,50,50`),
    );
    expect(notes.filter(({ code }) => code === "never-changes").map(({ message }) => message)).toEqual([
      expect.stringContaining("seeding depth"),
    ]);
  });
});

describe("degrees and minutes", () => {
  const texts = readDegreesForm("degrees minutes");
  // Worked by hand: 25.026 / 60 = 0.4171; 36.744 / 60 = 0.6124; 1.56 / 3600 = 0.000433...
  it.each([
    [`38°25.026'N`, 38.4171],
    [`N 38 25.026`, 38.4171],
    [`98° 36' 44.64" W`, -98.6124],
    [`-98 36.744`, -98.6124],
    [`98.6124 W`, -98.6124],
    [`33:51:36S`, -33.86],
    [`38d25m01.56s`, 38.4171],
    [`38d25m01.56sS`, -38.4171],
    [`38 61`, NaN],
    [`north`, NaN],
    [``, NaN],
  ])("%s", (text, degrees) => {
    const read = texts ? parseDegrees(text, texts) : 0;
    if (Number.isNaN(degrees)) expect(read).toBeNaN();
    else expect(read).toBeCloseTo(degrees, 9);
  });

  it("are recognised as texts, read by the format, and said", async () => {
    const source = textSource(
      `t_s,lon,lat,DF_1_N,DF_2_N\n${rows(30, (i) => `${i},98°36.${740 + i}'W,38°25.${100 + i}'N,${900 + i},950`)}\n`,
    );
    const inspection = await mustInspect(source, FIELD);
    expect(codesOf(inspection)).toEqual(["degrees-minutes"]);
    expect(inspection.columns[1]?.words).toContain("is -98.612333 degrees");
    const { log } = await readAsProposed(source);
    expect(log.longitude[4]).toBeCloseTo(-98.6124, 9);
    expect(log.latitude[0]).toBeCloseTo(38.418333333, 8);
  });

  it("packed into one number without a sign: the field's place tells the half of the globe", async () => {
    const source = textSource(
      `t_s,lon,lat,DF_1_N,DF_2_N\n${rows(30, (i) => `${i},9836.${740 + i},3825.${100 + i},${900 + i},950`)}\n`,
    );
    const inspection = await mustInspect(source, FIELD);
    expect(inspection.columns.slice(1, 3).map(({ proposal }) => proposal?.format)).toEqual([
      "ddmm.mmmm W",
      "ddmm.mmmm",
    ]);
    expect(codesOf(inspection)).toEqual(["degrees-minutes", "signs-left-out"]);
    const { log } = await mustRead(source, proposeMapping(inspection).mapping);
    expect(log.longitude[4]).toBeCloseTo(-98.6124, 9);
  });

  it("a sign left out of plain degrees is found by the field's place", async () => {
    const source = table("DF_1_N,DF_2_N", 30, (i) => `${900 + i},950`);
    const text = textSource(
      new TextDecoder().decode((await source.stream()[Symbol.asyncIterator]().next()).value).replaceAll("-98", "98"),
    );
    const inspection = await mustInspect(text, FIELD);
    expect(codesOf(inspection)).toContain("signs-left-out");
    const { log } = await mustRead(text, proposeMapping(inspection).mapping);
    expect(log.longitude[0]).toBeCloseTo(-98.61, 9);
  });

  it("a format that means nothing is refused with the ones that do", async () => {
    const columns: LogMapping["columns"] = SIMPLE_MAPPING.columns.map((column) =>
      column.channel === "latitude" ? { ...column, format: "furlongs" } : column,
    );
    const error = await errorOf(textSource("t,lon,lat,DF_1,DF_2\n1,-98.6,38.4,1,2\n"), { ...SIMPLE_MAPPING, columns });
    expect(error).toMatchObject({ code: "mapping-invalid", column: "lat" });
    expect(error?.message).toContain("ddmm.mmmm");
  });
});

describe("easting and northing without a system", () => {
  // cs2cs EPSG:4326 EPSG:32614 of 40 N 100 W: 414639.538157 4428236.064633.
  const source = textSource(
    `t_s,easting_m,northing_m,DF_1_N,DF_2_N\n${rows(30, (i) => `${i},${414639 + i},${4428236 + i},${900 + i},950`)}\n`,
  );

  it("offers the zones that put the log near the field", async () => {
    const inspection = await mustInspect(source, { longitude: -100.01, latitude: 40.01 });
    expect(inspection.crsCandidates?.map(({ crs }) => crs)).toEqual(["EPSG:32614"]);
    expect(inspection.crsCandidates?.[0]?.words).toContain("UTM zone 14 north");
    expect(codesOf(inspection)).toContain("systems-offered");
  });

  it("offers nothing where no zone fits, or where nobody said where the field is", async () => {
    for (const near of [undefined, { longitude: 25, latitude: 60 }]) {
      const inspection = await mustInspect(source, near);
      expect(inspection.crsCandidates).toBeUndefined();
      expect(codesOf(inspection)).toContain("system-unknown");
    }
  });

  it("never applies a system by itself", async () => {
    expect((await errorOf(source))?.code).toBe("unknown-projection");
  });
});

describe("GPS weeks and seconds", () => {
  // Week 2314, second 239825.25 is GPS 1399747025.25 s = 2024-05-14 18:36:47.250 UTC with 18 leap seconds (worked by hand).
  const file = (week: number) =>
    textSource(
      `gps_week,gps_seconds,lon,lat,DF_1_N,DF_2_N\n${rows(30, (i) => `${week},${239825.25 + i},-98.61,${38.41 + i / 1e5},${900 + i},950`)}\n`,
    );

  it("are one time", async () => {
    const { log } = await readAsProposed(file(2314));
    expect(new Date(log.timeMs[0] ?? NaN).toISOString()).toBe("2024-05-14T18:36:47.250Z");
    expect((log.timeMs[1] ?? 0) - (log.timeMs[0] ?? 0)).toBe(1000);
  });

  it("that began again at 0 are said, and read by the week their 0 stands for", async () => {
    const source = file(2314 - 2048);
    const inspection = await mustInspect(source);
    expect(codesOf(inspection)).toContain("gps-week-short");
    const { mapping } = proposeMapping(inspection);
    const columns = mapping.columns.map((column) =>
      column.unit === "gps-week" ? { ...column, format: "from 2048" } : column,
    );
    const { log } = await mustRead(source, { ...mapping, columns });
    expect(new Date(log.timeMs[0] ?? NaN).toISOString()).toBe("2024-05-14T18:36:47.250Z");
  });

  it("a week alone is no time", async () => {
    const columns: LogMapping["columns"] = SIMPLE_MAPPING.columns.map((column) =>
      column.channel === "time" ? { ...column, unit: "gps-week" } : column,
    );
    const error = await errorOf(textSource("t,lon,lat,DF_1,DF_2\n1,-98.6,38.4,1,2\n"), { ...SIMPLE_MAPPING, columns });
    expect(error).toMatchObject({ code: "mapping-mismatch", column: "t" });
  });
});
