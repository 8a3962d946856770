import { describe, expect, it } from "vitest";
import { describeColumn } from "@/lib/ingest/columns/describe-column";
import { proposeMapping } from "@/lib/ingest/propose-mapping";
import { mustInspect, textSource } from "@/tests/lib/ingest/support/make-source";

const PLACE = "-98.612,38.417";

/** The proposal for one column headed `header` with these cells. */
async function proposalOf(header: string, cells: string[]) {
  const text = `lon,lat,${header}\n${cells.map((cell) => `${PLACE},${cell}`).join("\n")}\n`;
  const inspection = await mustInspect(textSource(text));
  return inspection.columns[2]?.proposal ?? null;
}

describe("proposals from header words and values", () => {
  it.each([
    ["DF_lbf", ["210", "215"], "downforce", "lbf"],
    ["Applied force (N)", ["900", "950"], "downforce", "N"],
    ["Down force lbs", ["210", "215"], "downforce", "lbf"],
    ["downforce[kN]", ["0.9", "1.1"], "downforce", "kN"],
    ["Gauge wheel load daN", ["31", "29"], "margin", "daN"],
    ["margin_N", ["300", "310"], "margin", "N"],
    ["Ground contact", ["0.97", "1"], "contact", "fraction"],
    ["Ground contact", ["97", "100"], "contact", "percent"],
    ["contact_pct", ["97", "100"], "contact", "percent"],
    ["seedDepth in", ["1.75", "2"], "depth", "in"],
    ["depth_mm", ["45", "50"], "depth", "mm"],
    ["speed_km_h", ["8.5", "9"], "speed", "km/h"],
    ["Speed (mph)", ["5", "5.4"], "speed", "mph"],
    ["gps speed m/s", ["2.4", "2.2"], "speed", "m/s"],
    ["course", ["181.2", "182"], "heading", "deg"],
    ["time", ["2026-09-24T14:05:00Z", "2026-09-24T14:05:01Z"], "time", "iso8601"],
    ["timestamp", ["1948025100", "1948025101"], "time", "unix-s"],
    ["timestamp", ["1948025100000", "1948025101000"], "time", "unix-ms"],
    ["gps time", ["1442000000", "1442000001"], "time", "gps-s"],
    ["time_s", ["0", "1"], "time", "s"],
    ["Working", ["on", "off"], "working", "boolean"],
    ["pass", ["1", "2"], "pass", "1"],
    ["Moisture (%)", ["15.5", "16"], "moisture", "percent"],
    ["Grain flow (lb/s)", ["12", "13"], "yieldFlow", "lb/s"],
    ["Population (1/ac)", ["34000", "33500"], "population", "1/ac"],
    ["Dry yield (bu/ac)", ["60", "64"], "yieldMass", "bu/ac"],
    ["swath width ft", ["20", "20"], "swathWidth", "ft"],
  ])("%s", async (header, cells, channel, unit) => {
    expect(await proposalOf(header, cells)).toMatchObject({ channel, unit });
  });

  it.each([
    ["Geschwindigkeit (km/h)", ["8.1", "8.3"], "speed", "km/h"],
    ["Tiefe [cm]", ["4.5", "5"], "depth", "cm"],
    ["Kurs (°)", ["181.2", "12"], "heading", "deg"],
    ["Stützlast (daN)", ["31", "29"], "margin", "daN"],
    ["Profondeur (mm)", ["45", "50"], "depth", "mm"],
    ["Vitesse (m/s)", ["2.1", "2.3"], "speed", "m/s"],
    ["Humidité (%)", ["15.5", "16"], "moisture", "percent"],
    ["Profundidad (cm)", ["4.5", "5"], "depth", "cm"],
    ["Velocidad (km/h)", ["8.1", "8.3"], "speed", "km/h"],
  ])("other languages: %s", async (header, cells, channel, unit) => {
    expect(await proposalOf(header, cells)).toMatchObject({ channel, unit });
  });

  it.each(["Längengrad;Breitengrad", "Longitud;Latitud", "Länge (°);Breite (°)"])("positions: %s", async (headers) => {
    const inspection = await mustInspect(textSource(`${headers};N\n-98.6;38.4;1\n-98.7;38.5;2\n`));
    const channels = inspection.columns.slice(0, 2).map((column) => column.proposal?.channel);
    expect(channels).toEqual(["longitude", "latitude"]);
  });

  it.each([
    ["Schardruck Reihe 1 (kgf),Schardruck Reihe 2 (kgf)", "downforce", "kgf"],
    ["force d'appui rang 1 (daN),force d'appui rang 2 (daN)", "downforce", "daN"],
    ["Profundidad surco 01 (mm),Profundidad surco 02 (mm)", "depth", "mm"],
  ])("rows in other languages: %s", async (headers, channel, unit) => {
    const inspection = await mustInspect(textSource(`lon,lat,${headers}\n${PLACE},45,46\n${PLACE},44,47\n`));
    const proposals = inspection.columns.slice(2).map((column) => column.proposal);
    expect(proposals).toMatchObject([
      { channel, unit, row: 1 },
      { channel, unit, row: 2 },
    ]);
    expect(inspection.shape).toBe("wide");
  });

  it("says unit and row of a column whose meaning it does not know", async () => {
    const headers = "Ukwaa 01 (kgf),Ukwaa 02 (kgf),zork rang 0,zork rang 1,Lone 7 [cm],plain";
    const inspection = await mustInspect(
      textSource(`lon,lat,${headers}\n${PLACE},1,2,3,4,5,6\n${PLACE},2,3,4,5,6,7\n`),
    );
    const columns = inspection.columns.slice(2);
    expect(columns.map((column) => column.proposal?.channel)).toEqual(
      expect.not.arrayContaining(["downforce", "depth", "margin"]),
    );
    expect(columns.map((column) => column.hint)).toEqual([
      { unit: "kgf", row: 1 },
      { unit: "kgf", row: 2 },
      { row: 1 },
      { row: 2 },
      { unit: "cm" },
      undefined,
    ]);
  });

  it("guesses no unit that nothing names", async () => {
    for (const header of ["downforce", "downforce (clicks)", "margin", "depth", "speed"]) {
      const proposal = await proposalOf(header, ["12", "13"]);
      expect(proposal?.unit).toBeNull();
      expect(proposal?.confidence).toBeLessThan(0.5);
    }
  });

  it("keeps a pressure a pressure and says so", async () => {
    const inspection = await mustInspect(textSource(`lon,lat,down pressure psi\n${PLACE},400\n${PLACE},420\n`));
    expect(inspection.columns[2]?.proposal?.unit).toBe("psi");
    expect(inspection.columns[2]?.words).toContain("never shown as a force");
  });

  it("is unsure where header and values disagree", async () => {
    expect((await proposalOf("contact (fraction)", ["97", "100"]))?.confidence).toBeLessThan(0.5);
    expect((await proposalOf("speed (m/s)", ["80", "90"]))?.confidence).toBeLessThan(0.5);
  });

  it("asks which of day and month comes first when both fit", async () => {
    const both = await proposalOf("date time", ["03/05/2026 14:22:01", "03/05/2026 14:22:02"]);
    expect(both).toMatchObject({ channel: "time", unit: "local" });
    expect(both?.confidence).toBeLessThan(0.5);
    const one = await proposalOf("date time", ["23/05/2026 14:22:01", "23/05/2026 14:22:02"]);
    expect(one).toMatchObject({ unit: "local", format: "dd/MM/yyyy HH:mm:ss" });
  });

  it("does not recognise what it does not know", async () => {
    expect(await proposalOf("AUX_3", ["17", "18"])).toBeNull();
  });
});

describe("row numbers in headers", () => {
  it.each([
    ["DF_01_lbf,DF_02_lbf"],
    ["downforce row 1 (lbf),downforce row 2 (lbf)"],
    ["r1 df lbf,r2 df lbf"],
    ["downforce[1] lbf,downforce[2] lbf"],
    ["row unit 1 downforce_lbf,row unit 2 downforce_lbf"],
    ["DF_lbf_1,DF_lbf_2"],
    ["DF_00_lbf,DF_01_lbf"],
  ])("%s", async (headers) => {
    const inspection = await mustInspect(textSource(`lon,lat,${headers}\n${PLACE},200,210\n${PLACE},201,211\n`));
    expect(inspection.shape).toBe("wide");
    expect(inspection.columns.slice(2).map((column) => column.proposal)).toMatchObject([
      { channel: "downforce", row: 1, unit: "lbf" },
      { channel: "downforce", row: 2, unit: "lbf" },
    ]);
  });

  it("is less sure of rows with a gap", async () => {
    const inspection = await mustInspect(textSource(`lon,lat,DF_1_N,DF_3_N\n${PLACE},200,210\n${PLACE},200,210\n`));
    expect(inspection.columns[2]?.proposal?.confidence).toBeLessThan(0.7);
  });

  it("takes a row column for the long shape", async () => {
    const inspection = await mustInspect(textSource(`lon,lat,row,DF_N\n${PLACE},1,200\n${PLACE},2,210\n`));
    expect(inspection.shape).toBe("long");
  });
});

describe("places", () => {
  const SWAPPED = "lat,lon,DF_N\n-98.61,38.41,200\n-98.62,38.42,210\n";
  it("notices swapped columns by the range of a latitude", async () => {
    const inspection = await mustInspect(textSource(SWAPPED));
    expect(inspection.columns.slice(0, 2).map((column) => column.proposal?.channel)).toEqual(["longitude", "latitude"]);
    expect(inspection.notes.map((note) => note.code)).toContain("swapped-positions");
    expect(inspection.columns[0]?.proposal?.confidence).toBeLessThan(0.5);
  });

  it("notices swapped columns by the field's place where the range cannot tell", async () => {
    const source = textSource("lon,lat,DF_N\n38.41,-28.61,200\n38.42,-28.62,210\n");
    expect((await mustInspect(source)).notes).toEqual([]);
    const inspection = await mustInspect(source, { longitude: -28.6, latitude: 38.4 });
    expect(inspection.columns[0]?.proposal?.channel).toBe("latitude");
  });

  it("notices positions far from the field, and missing ones", async () => {
    const far = await mustInspect(textSource("lon,lat,DF_N\n10,50,200\n10,50,210\n"), {
      longitude: -98.6,
      latitude: 38.4,
    });
    expect(far.notes.map((note) => note.code)).toEqual(["far-from-field"]);
    const none = await mustInspect(textSource("t_s,DF_N\n0,200\n1,210\n"));
    expect(none.notes.map((note) => note.code)).toEqual(["missing-position"]);
  });
});

describe("describeColumn", () => {
  it("says what the issue asks for", () => {
    const column = { name: "DF_07_lbf", sample: ["212", "215"] };
    expect(describeColumn(column, { channel: "downforce", row: 7, unit: "lbf" })).toBe(
      "Column 'DF_07_lbf' is the downforce of row 7 in pounds-force; 212 lbf here is 943 N.",
    );
    expect(describeColumn(column, { channel: "downforce", row: 7, unit: "N" })).toBe(
      "Column 'DF_07_lbf' is the downforce of row 7 in newtons, for example 212 N.",
    );
    expect(describeColumn(column, { channel: "downforce", row: 7, unit: null })).toContain("choose one");
    expect(describeColumn(column, null)).toBe("Column 'DF_07_lbf' is not used.");
  });

  it("asks for the weight of a bushel", () => {
    const column = { name: "yield", sample: ["60"] };
    expect(describeColumn(column, { channel: "yieldMass", unit: "bu/ac" })).toContain("weight of a bushel");
    // 60 bu/ac of 48 lb is 3228 kg/ha, 0.323 kg/m2 (GNU units 2.22).
    expect(describeColumn(column, { channel: "yieldMass", unit: "bu/ac", format: "48 lb" })).toContain("0.323 kg/m2");
  });

  it("leaves columns without a unit out of the proposed mapping", async () => {
    const inspection = await mustInspect(textSource(`lon,lat,downforce\n${PLACE},200\n${PLACE},210\n`));
    const { mapping, undecided } = proposeMapping(inspection);
    expect(undecided).toEqual(["downforce"]);
    expect(mapping.columns.map((column) => column.name)).toEqual(["lon", "lat"]);
  });
});
