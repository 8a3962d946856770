import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { readBushelWeight } from "@/lib/ingest/records/bushel-weight";
import { measureResolution } from "@/lib/ingest/records/measure-resolution";
import { parseBoolean } from "@/lib/ingest/records/parse-boolean";
import { isMissing, parseNumber } from "@/lib/ingest/records/parse-number";

describe("parseNumber", () => {
  it.each([
    ["12.5", 12.5],
    [" -3 ", -3],
    ["+.5", 0.5],
    ["1e3", 1000],
    ["1.", 1],
    ["123456789012345678", 123456789012345678],
    ["-98.612537830000000000", -98.61253783],
  ])("reads %j", (text, value) => expect(parseNumber(text)).toBe(value));

  it.each(["", "abc", "0x10", "Infinity", "1,5", "1e999", "--1", "1 2", "٣"])("refuses %j", (text) => {
    expect(parseNumber(text)).toBeNaN();
  });

  it("reads decimal commas only when told to", () => {
    expect(parseNumber("12,5", true)).toBe(12.5);
    expect(parseNumber("-,5", true)).toBe(-0.5);
    expect(parseNumber("12.5", true)).toBe(12.5);
    expect(parseNumber("12,", true)).toBeNaN();
  });

  it("rounds exactly as Number does", () => {
    fc.assert(
      fc.property(fc.integer({ min: -999_999_999, max: 999_999_999 }), fc.integer({ min: 0, max: 999_999 }), (a, b) => {
        const text = `${a}.${String(b).padStart(6, "0")}`;
        expect(parseNumber(text)).toBe(Number(text));
      }),
    );
  });

  it("knows what means nothing", () => {
    expect(["", " ", "NA", "null", "NaN", "-"].every(isMissing)).toBe(true);
    expect(isMissing("0")).toBe(false);
  });
});

describe("parseBoolean", () => {
  it("reads the forms files use", () => {
    expect(["1", "true", "ON", "yes", "Y", "2"].map(parseBoolean)).toEqual([1, 1, 1, 1, 1, 1]);
    expect(["0", "False", "off", "no", "0.0"].map(parseBoolean)).toEqual([0, 0, 0, 0, 0]);
    expect(["", "maybe", "NaN"].map(parseBoolean)).toEqual([NaN, NaN, NaN]);
  });
});

describe("readBushelWeight", () => {
  it("reads pounds and kilograms, and nothing else", () => {
    expect(readBushelWeight("56 lb")).toBe(56);
    expect(readBushelWeight("60")).toBe(60);
    // 27.2155422 kg is 60 lb exactly (NIST SP 811).
    expect(readBushelWeight("27.2155422 kg")).toBeCloseTo(60, 10);
    expect([undefined, "", "heavy", "0 lb"].map(readBushelWeight)).toEqual([null, null, null, null]);
  });
});

describe("measureResolution", () => {
  it("finds the file's own rounding behind a unit and Float32", () => {
    const lbf = 4.4482216152605;
    const values = Float32Array.from({ length: 5000 }, (_, i) => (200 + ((i * 7919) % 1000) * 0.1) * lbf);
    expect(measureResolution(values, lbf)).toBeCloseTo(0.1 * lbf, 9);
  });

  it("is null when nothing changes or nothing is there", () => {
    expect(measureResolution(new Float32Array(10).fill(3), 1)).toBeNull();
    expect(measureResolution(new Float32Array(10).fill(NaN), 1)).toBeNull();
    expect(measureResolution(new Float32Array(0), 1)).toBeNull();
  });
});
