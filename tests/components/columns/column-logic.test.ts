import { describe, expect, it } from "vitest";
import { buildMapping } from "@/components/columns/build-mapping";
import { checkChoices } from "@/components/columns/check-choices";
import { confidenceWord, startChoices } from "@/components/columns/column-choice";
import { columnSections } from "@/components/columns/column-sections";
import { groupColumns } from "@/components/columns/group-columns";
import { sayColumn, sayGroup } from "@/components/columns/say-meaning";
import { LogMapping } from "@/lib/ingest/mapping";
import { makeColumn, makeFound } from "@/tests/components/columns/make-columns";

const NO_EXTRAS = { crs: "", timeZone: "" };

describe("groups of columns", () => {
  it("takes columns of one channel row by row as one, and others alone", () => {
    const groups = groupColumns(makeFound([makeColumn("SPD_mph", {})]).columns);
    expect(groups.map((group) => group.columns.length)).toEqual([1, 1, 3, 1]);
  });

  it("says a group as one sentence with its rows and one worked number", () => {
    const found = makeFound();
    const columns = found.columns.slice(2);
    const choices = Object.values(startChoices(found)).slice(2);
    // 212 lbf = 212 * 4.4482216152605 N = 943.02 N (NIST SP 811, pound-force)
    expect(sayGroup(columns, choices)).toBe(
      "Columns 'DF_01_lbf' … 'DF_03_lbf' are the downforce of rows 1 to 3 in pounds-force; 212 lbf here is 943 N.",
    );
  });

  it("does not say as one what has come to mean several things", () => {
    const found = makeFound();
    const choices = Object.values(startChoices(found)).slice(2);
    const changed = choices.map((choice, index) => (index === 1 ? { ...choice, channel: "margin" as const } : choice));
    expect(sayGroup(found.columns.slice(2), changed)).toBeNull();
  });

  it("says anew what a person changed", () => {
    const [column] = makeFound().columns.slice(2);
    const choice = {
      use: "channel",
      channel: "margin",
      row: 7,
      unit: "N",
      format: "",
      missing: "",
      seen: true,
    } as const;
    expect(column && sayColumn(column, choice)).toContain("of row 7 in newtons");
  });
});

describe("what must be decided", () => {
  it("waits for unknown columns, unsure ones, and ones without a unit", () => {
    const found = makeFound([
      makeColumn("AUX_3", null),
      makeColumn("HDG", { channel: "heading", unit: "deg", confidence: 0.5 }),
      makeColumn("SPD", { channel: "speed", unit: null, confidence: 0.9 }),
    ]);
    const check = checkChoices(startChoices(found), "wide", NO_EXTRAS);
    expect(check.waiting).toEqual(["AUX_3", "HDG", "SPD"]);
    expect(columnSections(groupColumns(found.columns), false)[0]?.id).toBe("asks");
  });

  it("makes one question of columns on one card", () => {
    const downforce = { channel: "downforce", unit: "lbf", confidence: 0.5 } as const;
    const found = makeFound([
      makeColumn("AUX", null),
      ...[1, 2, 3].map((row) => makeColumn(`DF_${row}`, { ...downforce, row })),
    ]);
    const cards = groupColumns(found.columns).map(({ columns }) => columns.map(({ name }) => name));
    const check = checkChoices(startChoices(found), "wide", { ...NO_EXTRAS, cards });
    expect(check.waiting).toEqual(["AUX", "DF_1", "DF_2", "DF_3"]);
    expect(check.questions).toBe(2);
  });

  it("draws its lines at 0.7 and 0.9", () => {
    expect([0.69, 0.7, 0.89, 0.9].map(confidenceWord)).toEqual(["please check", "likely", "likely", "sure"]);
  });

  it("refuses a file without a position, a projected one without a system, local times without a zone", () => {
    const bare = checkChoices(
      startChoices({ ...makeFound(), columns: makeFound().columns.slice(2) }),
      "wide",
      NO_EXTRAS,
    );
    expect(bare.general[0]).toContain("where the machine was");
    const projected = makeFound();
    projected.columns.splice(
      0,
      2,
      makeColumn("E", { channel: "easting", unit: "m" }),
      makeColumn("N", { channel: "northing", unit: "m" }),
      makeColumn("T", { channel: "time", unit: "local", format: "dd/MM/yyyy HH:mm:ss" }),
    );
    const check = checkChoices(startChoices(projected), "wide", NO_EXTRAS);
    expect(check.needsCrs && check.needsTimeZone).toBe(true);
    expect(check.general).toHaveLength(2);
    const settled = checkChoices(startChoices(projected), "wide", { crs: "EPSG:32614", timeZone: "America/Chicago" });
    expect(settled.general).toEqual([]);
  });

  it("names the column that is the same thing as another", () => {
    const choices = startChoices(makeFound());
    const second = choices["DF_02_lbf"];
    if (!second) throw new Error("the fixture has no second row");
    const check = checkChoices({ ...choices, DF_02_lbf: { ...second, row: 1 } }, "wide", NO_EXTRAS);
    expect(check.problems["DF_02_lbf"]).toContain("DF_01_lbf is the downforce of row 1 already");
  });
});

describe("the mapping that is sent", () => {
  it("names what is read, leaves out the rest, and is one the reader takes", () => {
    const found = makeFound([makeColumn("AUX_3", null)]);
    const mapping = buildMapping(startChoices(found), "wide", { ...NO_EXTRAS, save: " Larkspur drill " });
    expect(mapping.columns.map((column) => column.name)).not.toContain("AUX_3");
    expect(mapping.save).toBe("Larkspur drill");
    expect(LogMapping.parse(mapping)).toEqual(mapping);
  });

  it("opens again with the meanings in force, not with fresh proposals", () => {
    const found = makeFound();
    const mapping = { shape: "wide", columns: [{ name: "LON_deg", channel: "longitude", unit: "deg" }] };
    const choices = startChoices({ ...found, mapping });
    expect(choices["LON_deg"]).toMatchObject({ use: "channel", seen: true });
    expect(choices["DF_01_lbf"]).toMatchObject({ use: "out", seen: true });
  });
});
