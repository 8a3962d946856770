import { describe, expect, it } from "vitest";
import { headerSignature, mappingFits, parseMapping } from "@/lib/ingest/mapping";
import { errorOf, mustInspect, SIMPLE_HEADER, SIMPLE_MAPPING, textSource } from "./support/make-source";

const FILE = textSource(`${SIMPLE_HEADER}\n0,-98.6,38.4,200,210\n1,-98.6,38.4,200,210\n`);

describe("parseMapping", () => {
  it("takes the mapping of the API", () => {
    expect(parseMapping({ ...SIMPLE_MAPPING, timeZone: "UTC", save: "Drill" }).ok).toBe(true);
    expect(
      parseMapping({ shape: "single", columns: [{ name: "x", channel: "other:box weight", unit: "kg" }] }).ok,
    ).toBe(true);
  });

  it("names the column of an unknown unit", () => {
    const outcome = parseMapping({
      shape: "wide",
      columns: [{ name: "DF_1", channel: "downforce", row: 1, unit: "clicks" }],
    });
    expect(outcome).toMatchObject({ ok: false, error: { code: "unknown-unit", column: "DF_1" } });
  });

  it.each([
    null,
    3,
    {},
    { shape: "wide", columns: [] },
    { shape: "wide", columns: [{ name: "a", channel: "resistance", unit: "N" }] },
  ])("refuses %j", (input) =>
    expect(parseMapping(input)).toMatchObject({ ok: false, error: { code: "mapping-invalid" } }),
  );
});

describe("a mapping against a file", () => {
  it("fits by names and shape", async () => {
    const inspection = await mustInspect(FILE);
    expect(mappingFits(SIMPLE_MAPPING, inspection)).toBe(true);
    expect(mappingFits({ ...SIMPLE_MAPPING, shape: "single" }, inspection)).toBe(false);
    const other = await mustInspect(textSource("t,lon,lat,X_1,X_2\n0,-98.6,38.4,1,2\n"));
    expect(mappingFits(SIMPLE_MAPPING, other)).toBe(false);
    expect(headerSignature(inspection)).not.toBe(headerSignature(other));
    expect(headerSignature(inspection)).toBe(headerSignature(await mustInspect(FILE)));
  });

  const column = (name: string, channel: string, unit: string, rest = {}) => ({ name, channel, unit, ...rest });
  const place = [column("lon", "longitude", "deg"), column("lat", "latitude", "deg")];
  it.each([
    ["mapping-mismatch", { shape: "wide", columns: [...place, column("nowhere", "speed", "m/s")] }],
    [
      "mapping-mismatch",
      {
        shape: "wide",
        columns: [...place, column("t", "downforce", "N", { row: 1 }), column("DF_1", "downforce", "N", { row: 1 })],
      },
    ],
    [
      "mapping-mismatch",
      {
        shape: "wide",
        columns: [...place, column("t", "downforce", "N"), column("DF_1", "downforce", "N", { row: 1 })],
      },
    ],
    ["mapping-mismatch", { shape: "single", columns: [...place, column("DF_1", "downforce", "N", { row: 1 })] }],
    ["mapping-mismatch", { shape: "wide", columns: [...place, column("DF_1", "speed", "m/s", { row: 1 })] }],
    ["unit-does-not-fit", { shape: "wide", columns: [...place, column("DF_1", "depth", "lbf", { row: 1 })] }],
    ["unit-does-not-fit", { shape: "wide", columns: [...place, column("DF_1", "downforce", "1", { row: 1 })] }],
    [
      "unit-does-not-fit",
      {
        shape: "wide",
        columns: [
          ...place,
          column("DF_1", "downforce", "N", { row: 1 }),
          column("DF_2", "downforce", "psi", { row: 2 }),
        ],
      },
    ],
    ["missing-position", { shape: "wide", columns: [column("DF_1", "downforce", "N", { row: 1 })] }],
    ["missing-row", { shape: "long", columns: [...place, column("DF_1", "downforce", "N")] }],
    ["unknown-projection", { shape: "wide", columns: [column("lon", "easting", "m"), column("lat", "northing", "m")] }],
    [
      "unknown-projection",
      { shape: "wide", crs: "EPSG:9", columns: [column("lon", "easting", "m"), column("lat", "northing", "m")] },
    ],
    ["unknown-time-zone", { shape: "wide", columns: [...place, column("t", "time", "local", { format: "HH:mm" })] }],
    ["unknown-time-zone", { shape: "wide", timeZone: "Moon", columns: place }],
    ["unknown-time-format", { shape: "wide", timeZone: "UTC", columns: [...place, column("t", "time", "local")] }],
    ["bushel-weight-missing", { shape: "single", columns: [...place, column("t", "yieldMass", "bu/ac")] }],
  ])("stops with %s", async (code, input) => {
    const mapping = parseMapping(input);
    if (!mapping.ok) throw new Error(mapping.error.message);
    const error = await errorOf(FILE, mapping.value);
    expect(error?.code).toBe(code);
    expect(error?.message).toMatch(/\.$/);
    expect(error?.message).not.toContain("!");
  });
});
