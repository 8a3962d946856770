import { describe, expect, it } from "vitest";
import type { LogMapping } from "@/lib/ingest/mapping";
import { proposeMapping } from "@/lib/ingest/propose-mapping";
import { errorOf, mustInspect, mustRead, readAsProposed, textSource } from "@/tests/lib/ingest/support/make-source";

const rows = (count: number, line: (i: number) => string) =>
  Array.from({ length: count }, (_, i) => line(i)).join("\n");
/** One record a second, 2 m further north each: 2 / 111,320 of a degree. */
const at = (i: number) => `${i},-98.61,${(38.41 + (i * 2) / 111_320).toFixed(8)}`;
const table = (header: string, count: number, cells: (i: number) => string) =>
  textSource(`t_s,lon,lat,${header}\n${rows(count, (i) => `${at(i)},${cells(i)}`)}\n`);
const codesOf = ({ notes }: { notes: { code: string }[] }) => notes.map((note) => note.code);

describe("what columns hold still, before anything is read", () => {
  it("one value for all rows is said", async () => {
    const averaged = await mustInspect(table("DF_1_N,DF_2_N,DF_3_N", 40, (i) => `${900 + i},${900 + i},${900 + i}`));
    expect(averaged.notes.find(({ code }) => code === "row-averaged")?.message).toContain("downforce");
    const apart = await mustInspect(table("DF_1_N,DF_2_N", 40, (i) => `${900 + i},${900 + (i === 30 ? 31 : i)}`));
    expect(codesOf(apart)).not.toContain("row-averaged");
  });

  it("a channel that never changes, and one row that does not while the others do", async () => {
    const whole = await mustInspect(table("depth_1_mm,depth_2_mm,DF_1_N", 60, (i) => `50,50,${900 + i}`));
    expect(whole.notes.filter(({ code }) => code === "steady-in-sample").map(({ message }) => message)).toEqual([
      expect.stringContaining("seeding depth"),
    ]);
    const one = await mustInspect(table("DF_1_N,DF_2_N,DF_3_N", 60, (i) => `${900 + i},412,${950 + (i % 7)}`));
    expect(one.notes.filter(({ code }) => code === "row-steady").map(({ message }) => message)).toEqual([
      expect.stringContaining("downforce of row 2"),
    ]);
  });

  it("full contact throughout is a good machine, and a few records are no evidence", async () => {
    expect(codesOf(await mustInspect(table("contact_1_pct,contact_2_pct", 60, () => "100,100")))).not.toContain(
      "steady-in-sample",
    );
    expect(codesOf(await mustInspect(table("DF_1_N,DF_2_N", 30, (i) => `900,${i}`)))).not.toContain("row-steady");
  });
});

describe("margin beside downforce", () => {
  it("cannot be above it by more than a row unit weighs", async () => {
    // 1000 and 900 kgf of margin are 9.8 and 8.8 kN over a downforce of 0.9 kN.
    const odd = await mustInspect(
      table("DF_1_N,DF_2_N,margin_1_kgf,margin_2_kgf", 40, (i) => `${900 + i},${910 + i},${400 + i},${410 + i}`),
    );
    expect(codesOf(odd)).toContain("margin-above-force");
    expect(odd.columns[5]?.proposal?.confidence).toBeLessThan(0.7);
    expect(odd.columns[5]?.words).toContain("Please check");
  });

  it("may be above it by the weight of the row unit", async () => {
    const plain = await mustInspect(
      table("DF_1_N,DF_2_N,margin_1_N,margin_2_N", 40, (i) => `${200 + i},${210 + i},${700 + i},${710 + i}`),
    );
    expect(codesOf(plain)).not.toContain("margin-above-force");
  });

  it("a margin of some tens of newtons is doubted as kilograms; a light one is not", async () => {
    const low = await mustInspect(table("margin_1_N,margin_2_N", 40, (i) => `${45 + i},${50 + i}`));
    expect(low.notes.find(({ code }) => code === "newtons-like-kilograms")?.message).toContain("margin");
    const light = await mustInspect(table("margin_1_N,margin_2_N", 40, (i) => `${145 + i},${150 + i}`));
    expect(codesOf(light)).not.toContain("newtons-like-kilograms");
  });

  it("kilograms of weight on a gauge wheel are kilograms-force, to be looked at", async () => {
    const inspection = await mustInspect(
      table("Gauge wheel load row 1 (kg),Gauge wheel load row 2 (kg)", 40, (i) => `${30 + i},${35 + i}`),
    );
    expect(inspection.columns[3]?.proposal).toMatchObject({ channel: "margin", row: 1, unit: "kgf" });
    expect(inspection.columns[3]?.proposal?.confidence).toBeLessThan(0.75);
  });
});

describe("contact beside margin", () => {
  const lifted = (i: number) => i % 3 === 0;
  const contacts = (flip: (i: number) => boolean) =>
    table("margin_1_N,margin_2_N,contact_1,contact_2", 60, (i) => {
      const load = lifted(i) ? 0 : 300 + i;
      const share = flip(i) === load > 0 ? 0 : 1;
      return `${load},${load + 1 - 1},${share},${share}`;
    });

  it("agrees where a loaded wheel has contact", async () => {
    const codes = codesOf(await mustInspect(contacts(() => false)));
    expect(codes).not.toContain("contact-reversed");
    expect(codes).not.toContain("contact-contradicts");
  });

  it("counted as lost is recognised, said, and read as contact kept", async () => {
    const source = contacts(() => true);
    const inspection = await mustInspect(source);
    expect(codesOf(inspection)).toContain("contact-reversed");
    expect(inspection.columns[5]?.proposal).toMatchObject({ channel: "contact", format: "lost" });
    expect(inspection.columns[5]?.words).toContain("counted where it was lost");
    const { log } = await mustRead(source, proposeMapping(inspection).mapping);
    const contact = log.channels.find(({ id }) => id === "contact");
    // Record 0 was lifted, record 1 not.
    expect([...(contact?.values ?? [])].slice(0, 4)).toEqual([0, 0, 1, 1]);
  });

  it("that contradicts it now and then is said and left as it is", async () => {
    const inspection = await mustInspect(contacts((i) => i % 2 === 0));
    expect(codesOf(inspection)).toContain("contact-contradicts");
    expect(inspection.columns[5]?.proposal?.format).toBeUndefined();
  });

  it("is lost on all of its columns or on none", async () => {
    const columns: LogMapping["columns"] = [
      { name: "lon", channel: "longitude", unit: "deg" },
      { name: "lat", channel: "latitude", unit: "deg" },
      { name: "contact_1", channel: "contact", row: 1, unit: "fraction", format: "lost" },
      { name: "contact_2", channel: "contact", row: 2, unit: "fraction" },
    ];
    expect(
      await errorOf(
        contacts(() => false),
        { shape: "wide", columns },
      ),
    ).toMatchObject({
      code: "mapping-invalid",
      column: "contact_2",
    });
  });
});

describe("speed beside the distance between positions", () => {
  it.each([
    ["m/s", 2],
    ["km/h", 7.2],
    ["mph", 4.47],
  ])("without a unit it is in %s where that fits", async (unit, value) => {
    const inspection = await mustInspect(table("speed,DF_1_N", 40, (i) => `${value + (i % 3) / 100},${900 + i}`));
    expect(inspection.columns[3]?.proposal).toMatchObject({ channel: "speed", unit });
    const { log } = await readAsProposed(table("speed,DF_1_N", 40, () => `${value},900`));
    expect(log.speedMps?.[5]).toBeCloseTo(2, 1);
  });

  it("stays without one where nothing fits, and a named unit that does not fit is doubted", async () => {
    expect((await mustInspect(table("speed,DF_1_N", 40, (i) => `400,${i}`))).columns[3]?.proposal?.unit).toBeNull();
    const named = await mustInspect(table("speed_kmh,DF_1_N", 40, (i) => `2.0,${900 + i}`));
    expect(named.notes.find(({ code }) => code === "speed-disagrees")?.message).toContain("in m/s");
    expect(named.columns[3]?.proposal).toMatchObject({ unit: "km/h" });
    expect(named.columns[3]?.proposal?.confidence).toBeLessThan(0.7);
    expect(codesOf(await mustInspect(table("speed_kmh,DF_1_N", 40, (i) => `7.2,${900 + i}`)))).not.toContain(
      "speed-disagrees",
    );
  });
});

describe("one numbered column alone", () => {
  it("numbered 1 is the whole machine's; any other number is a row, and both can be read as proposed", async () => {
    const one = await mustInspect(table("DF_1_N", 40, (i) => `${900 + i}`));
    expect(one).toMatchObject({ shape: "single" });
    expect(one.columns[3]?.proposal?.row).toBeUndefined();
    const { log } = await readAsProposed(table("DF_1_N", 40, (i) => `${900 + i}`));
    expect(log.channels[0]).toMatchObject({ id: "downforce", perRow: false });
    const seventh = await readAsProposed(table("DF_7_N", 40, (i) => `${900 + i}`));
    expect(seventh.log.rows).toBe(7);
    expect(seventh.log.channels[0]?.values[6]).toBe(900);
  });
});

describe("times without an offset", () => {
  const stamped = (zone: string) =>
    textSource(
      `time,lon,lat,DF_1_N\n${rows(30, (i) => `2026-09-24T14:05:${String(i).padStart(2, "0")}${zone},-98.61,38.41,${900 + i}`)}\n`,
    );

  it("are said before they are read, and read in the zone that a person names", async () => {
    const source = stamped("");
    const inspection = await mustInspect(source);
    expect(codesOf(inspection)).toContain("time-names-no-zone");
    const { mapping } = proposeMapping(inspection);
    const local = await mustRead(source, { ...mapping, timeZone: "America/Chicago" });
    expect(new Date(local.log.timeMs[0] ?? NaN).toISOString()).toBe("2026-09-24T19:05:00.000Z");
    expect(codesOf(await mustRead(source, mapping))).toContain("time-without-zone");
  });

  it("with one are left alone", async () => {
    expect(codesOf(await mustInspect(stamped("Z")))).not.toContain("time-names-no-zone");
    expect(codesOf(await mustInspect(stamped("-05:00")))).not.toContain("time-names-no-zone");
  });
});
