import { describe, expect, it } from "vitest";
import type { LoggedDevice } from "@/lib/ingest/log-format";
import { compareDevice } from "@/lib/machines/compare-device";
import { draftSeeder, evenOffsetsM, measureDevice } from "@/lib/machines/describe-device";
import { MachineInput, SeederInput, type Seeder } from "@/lib/machines/machine";
import { noteDevice } from "@/lib/machines/note-device";
import { lengthsIn, sayDevice, sayDifference, sayMetres } from "@/lib/machines/say-device";

const device: LoggedDevice = {
  name: "Larkspur drill",
  rows: 4,
  rowOffsetsM: [-0.375, -0.125, 0.125, 0.375],
  rowForwardM: [0, 0, 0, 0],
  rowWidthsM: [0.25, 0.25, 0.25, 0.25],
  rowsBehindReferenceM: 2.1,
};
const seeder: Seeder = SeederInput.parse({
  kind: "seeder",
  name: "Chosen drill",
  rowCount: 4,
  rowSpacingM: 0.25,
  antennaToRowsM: 2,
  hitch: "rigid",
  rowUnitMassKg: 80,
});

describe("a machine made from a file's description", () => {
  it("has its rows, and nothing that the file does not say", () => {
    expect(measureDevice(device)).toEqual({
      rowCount: 4,
      rowSpacingM: 0.25,
      widthM: 1,
      isEven: true,
      isLevel: true,
    });
    const draft = draftSeeder(device);
    expect(draft).toEqual({
      kind: "seeder",
      name: "Larkspur drill",
      rowCount: 4,
      rowSpacingM: 0.25,
      hitch: "rigid",
      antennaRightM: 0,
    });
    expect(MachineInput.safeParse({ ...draft, antennaToRowsM: 2, rowUnitMassKg: 80 }).success).toBe(true);
    expect(MachineInput.safeParse(draft).success).toBe(false);
  });

  it("keeps rows that stand unevenly or in two ranks, and agrees with itself", () => {
    // Hand-worked: 0.25 m apart, but the two right of the middle 0.1 m further out.
    const uneven = {
      ...device,
      rowOffsetsM: [-0.375, -0.125, 0.225, 0.475],
      rowForwardM: [0.4, -0.4, 0.4, -0.4],
    };
    const draft = draftSeeder(uneven);
    expect(draft).toMatchObject({
      rowSpacingM: 0.25,
      rowOffsetsM: uneven.rowOffsetsM,
      rowForwardM: uneven.rowForwardM,
    });
    expect(measureDevice(uneven).widthM).toBeCloseTo(0.475 + 0.375 + 0.25, 9);
    const made = SeederInput.parse({ ...draft, antennaToRowsM: 2, rowUnitMassKg: 80 });
    expect(compareDevice(uneven, made)).toEqual([]);
  });
});

describe("the machine chosen for a log beside the file's description", () => {
  it.each([
    ["the same", {}, []],
    ["4 cm off is how a tape was held", { rowOffsetsM: evenOffsetsM(4, 0.25).map((offset) => offset + 0.04) }, []],
    ["other rows", { rowCount: 6 }, [{ kind: "rows", file: 4, machine: 6 }]],
    [
      "another spacing",
      { rowSpacingM: 0.3 },
      [
        { kind: "width", fileM: 1, machineM: 1.2 },
        { kind: "offset", row: 1, fileM: -0.375, machineM: -0.45 },
      ],
    ],
    [
      "one row elsewhere",
      { rowOffsetsM: [-0.375, -0.125, 0.185, 0.375] },
      [{ kind: "offset", row: 3, fileM: 0.125, machineM: 0.185 }],
    ],
  ])("%s", (_name, change, expected) => {
    const found = compareDevice(device, { ...seeder, ...change });
    expect(found).toHaveLength(expected.length);
    found.forEach((difference, index) => {
      for (const [key, value] of Object.entries(expected[index]!)) {
        const other = difference[key as keyof typeof difference] as unknown;
        if (typeof value === "number") expect(other).toBeCloseTo(value, 9);
        else expect(other).toBe(value);
      }
    });
  });

  it("a combine is no machine with rows", () => {
    expect(compareDevice(device, { kind: "combine", name: "C", headerWidthM: 6 })).toEqual([{ kind: "not-a-seeder" }]);
  });
});

describe("in words", () => {
  it("says the description in a person's units", () => {
    expect(sayDevice(device, lengthsIn("metric"))).toBe(
      "Larkspur drill: 4 rows 250\u202fmm apart, 1.00\u202fm wide. The rows stand 2.10\u202fm behind the machine's own reference point; where the antenna sits, the file does not say.",
    );
    // 0.25 m is 9.8425 in, 1 m is 3.2808 ft (NIST SP 811: 1 in = 25.4 mm, 1 ft = 0.3048 m exactly).
    expect(sayDevice({ ...device, rowsBehindReferenceM: null }, lengthsIn("imperial"))).toBe(
      "Larkspur drill: 4 rows 9.84\u202fin apart, 3.28\u202fft wide.",
    );
  });

  it("says a difference, and keeps it with the log", () => {
    const other = { ...seeder, rowOffsetsM: [-0.375, -0.125, 0.185, 0.375] };
    expect(sayDifference(compareDevice(device, other)[0]!, sayMetres)).toBe(
      "Row 3 stands 0.125 m right of the middle by the file, 0.185 m right of it by the chosen machine.",
    );
    expect(noteDevice(device, other)).toMatchObject([{ code: "device-disagrees", count: 1 }]);
    expect(noteDevice(device, seeder)).toEqual([]);
    expect(noteDevice(undefined, other)).toEqual([]);
    expect(noteDevice(device, null)).toEqual([]);
  });
});
