import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { givenClasses } from "@/lib/channels/given-classes";
import { MARGIN_BY_FORCE, marginByForceCode } from "@/lib/channels/margin-by-force";
import { resolveChannel, resolveChannelOrReason } from "@/lib/channels/resolve-channel";
import { categoriesOf, namedCodes } from "@/lib/legend/categories";
import { zonesTable } from "@/lib/export/columns/zones-table";
import { outlineOf } from "@/lib/export/log-parts";
import type { Seeder } from "@/lib/machines/machine";
import { gridOfPass } from "@/lib/map-state/paint-pass";
import { rowStatistics } from "@/lib/statistics/row-statistics";
import { buildTileIndex, tileIndexBounds } from "@/lib/tiles/build-tile-index";
import { rasteriseTile } from "@/lib/tiles/rasterise-tile";
import { summariseLog } from "@/lib/tiles/summarise-log";
import { tileAt } from "@/lib/tiles/tile-address";
import { buildZones } from "@/lib/zones/zones";
import { trackOfLog } from "@/tests/lib/map-state/track-of-log";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

const MACHINE = makeSeeder({ targetMarginN: 450, marginDeadbandN: 100, maxDownforceN: 1600 });
const { shortOfWeight, nearlyAtLimit, setTooLow, inBand, targetTooHigh, unitWeightTooMuch } = MARGIN_BY_FORCE;

type Read = (record: number, row: number) => number;

function place(read: { margin?: Read; downforce?: Read }, machine: Seeder | null = MACHINE, records = 60) {
  const channels = (["downforce", "margin"] as const).flatMap((id) => (read[id] ? [{ id, value: read[id] }] : []));
  const made = makeLog({ records: straightTrack({ from: [0, 0], headingDeg: 0, records }), channels });
  const built = buildLog(made, machine);
  if (!built.ok) throw new Error(built.error.message);
  return built.value.placed;
}

/** Row 1 .. 4 of the first record. */
const firstRecord = (placed: ReturnType<typeof place>, id: string) => [
  ...resolveChannel(placed, id)!.values.slice(0, 4),
];

describe("masks", () => {
  it("say where the margin is under target less its deadband, and nothing where none was logged", () => {
    const margin: Read = (_, row) => [349, 350, NaN, 900][row - 1]!;
    expect(firstRecord(place({ margin }), "underTarget")).toEqual([1, 0, NaN, 0]);
  });

  it("say where the force is at its limit to 1 % (hand-worked: 1600 - 16 = 1584)", () => {
    const downforce: Read = (_, row) => [1583, 1584, NaN, 1600][row - 1]!;
    expect(firstRecord(place({ downforce }), "atLimit")).toEqual([0, 1, NaN, 1]);
  });

  it("agree with the shares of the line-up", () => {
    const placed = place({ margin: (record, row) => 300 + ((record * 7 + row * 31) % 120) });
    const shares = rowStatistics(placed, "margin").items.map((item) => item.shareUnderTarget);
    const means = rowStatistics(placed, "underTarget").items.map((item) => item.mean);
    means.forEach((mean, row) => expect(mean).toBeCloseTo(shares[row]!, 6));
  });

  it("are refused with what is missing", () => {
    const said = (id: string, placed: ReturnType<typeof place>) => {
      const found = resolveChannelOrReason(placed, id);
      return found.ok ? "" : found.error;
    };
    const bare = place({ margin: () => 400, downforce: () => 900 }, makeSeeder());
    expect(said("underTarget", bare)).toMatch(/target margin/);
    expect(said("atLimit", bare)).toMatch(/highest force/);
    expect(said("marginByForce", bare)).toMatch(/target margin and how far off .* and the machine's highest force/);
    expect(said("underTarget", place({ downforce: () => 900 }))).toMatch(/margin of each row/);
    expect(said("deviation:marginByForce", place({ margin: () => 1, downforce: () => 1 }))).toMatch(/names/);
  });

  it("are offered only where the log and its machine give them", () => {
    const channels = ["margin", "downforce"].map((id) => ({ id, unit: "N", perRow: true }));
    expect(givenClasses(channels, MACHINE)).toEqual(["underTarget", "atLimit", "marginByForce"]);
    expect(givenClasses(channels, { ...MACHINE, marginDeadbandN: undefined })).toEqual(["underTarget", "atLimit"]);
    expect(givenClasses(channels, { targetMarginN: null, maxDownforceN: 1600 })).toEqual(["atLimit"]);
    expect(givenClasses([{ id: "margin", unit: "Pa", perRow: true }], MACHINE)).toEqual([]);
  });
});

describe("margin by force", () => {
  const levels = { underBelowN: 350, overAboveN: 550, atLimitFromN: 1584, nearLimitFromN: 1440, idleUpToN: 16 };

  it.each([
    [100, 1600, shortOfWeight],
    [349, 1584, shortOfWeight],
    [349, 1583, nearlyAtLimit],
    [-20, 1440, nearlyAtLimit],
    [100, 1439, setTooLow],
    [0, 0, setTooLow],
    [350, 1600, inBand],
    [550, 0, inBand],
    [551, 17, targetTooHigh],
    [900, 1600, targetTooHigh],
    [551, 16, unitWeightTooMuch],
    [NaN, 900, NaN],
    [900, NaN, NaN],
  ])("a margin of %d N under a force of %d N is class %d (hand-worked)", (margin, force, code) => {
    expect(marginByForceCode(margin, force, levels)).toBe(code);
  });

  it("comes out of a log reading by reading, and has a name for every code", () => {
    const margin: Read = (_, row) => [100, 450, 900, NaN][row - 1]!;
    const downforce: Read = (_, row) => [1600, 900, 0, 900][row - 1]!;
    expect(firstRecord(place({ margin, downforce }), "marginByForce")).toEqual([1, 4, 6, NaN]);
    const channel = resolveChannel(place({ margin, downforce }), "marginByForce")!;
    expect(categoriesOf("marginByForce")!.map(({ code }) => code)).toEqual([1, 2, 3, 4, 5, 6]);
    expect(channel.codeCount).toBe(namedCodes("marginByForce"));
  });
});

/** Two readings in three short of weight, the third with weight to spare: a mean would say "set too low", which none is. */
const mixed = () =>
  place({
    margin: (record) => (record % 3 === 2 ? 900 : 100),
    downforce: (record) => (record % 3 === 2 ? 0 : 1600),
  });

describe("names are never averaged", () => {
  it("far out a pixel and a column of the overview carry the name over the longest distance", () => {
    const placed = mixed();
    const channel = resolveChannel(placed, "marginByForce")!;
    const index = buildTileIndex(placed);
    const [west, south, east, north] = tileIndexBounds(index)!;
    const pixels = rasteriseTile(index, channel, { ...tileAt((west + east) / 2, (south + north) / 2, 13), size: 512 });
    expect(new Set(pixels.filter((value) => !Number.isNaN(value)))).toEqual(new Set([shortOfWeight]));
    expect(new Set(summariseLog(placed, channel, 4).values.flatMap((line) => [...line]))).toEqual(
      new Set([shortOfWeight]),
    );
  });

  it("nor in the unrolled pass", () => {
    const placed = mixed();
    const grid = gridOfPass(trackOfLog(placed, resolveChannel(placed, "marginByForce")!, 1), 5);
    expect(new Set(grid.flatMap((line) => [...line]))).toEqual(new Set([shortOfWeight]));
  });

  it("a row has the share of distance under each, and no mean (hand-worked: two in three)", () => {
    const [row] = rowStatistics(mixed(), "marginByForce").items;
    expect(row).toMatchObject({ n: 60, mean: null, p50: null, deviationZ: null, flagged: false });
    expect(row!.classShares!.map((share) => Math.round(share * 1000) / 1000)).toEqual([0.667, 0, 0, 0, 0, 0.333]);
    expect(row!.reason).toMatch(/names/);
  });

  it("a short stretch goes to its longer neighbour, whatever its number", () => {
    // 20 m in band, 1 m of "own weight", 9 m short of weight: by numbers 6 would be nearer to 4.
    const at = (record: number) => (record < 18 ? 1 : record < 20 ? 6 : 4);
    const placed = place({
      margin: (record) => ({ 1: 100, 4: 450, 6: 900 })[at(record)]!,
      downforce: (record) => ({ 1: 1600, 4: 900, 6: 0 })[at(record)]!,
    });
    const { features } = buildZones(placed, "marginByForce", { breaks: [1.5, 2.5, 3.5, 4.5, 5.5], minLengthM: 5 });
    const ofRow = features.map(({ properties }) => properties).filter(({ row }) => row === 1);
    expect(ofRow.map((zone) => [zone.class, zone.n])).toEqual([
      [0, 18],
      [3, 42],
    ]);
    expect(ofRow.every(({ mean, min, max }) => mean === null && min === null && max === null)).toBe(true);
  });

  it("an exported zone carries its name and no mean", () => {
    const breaks = [1.5, 2.5, 3.5, 4.5, 5.5];
    const { columns } = zonesTable(outlineOf(mixed()), { channel: "marginByForce", breaks });
    expect(columns.map(({ name }) => name)).not.toContain("mean");
    const [zone] = buildZones(mixed(), "marginByForce", { breaks }).features;
    const name = columns.find((column) => column.name === "name")!;
    expect(name.read(zone!.properties)).toBe("Short of weight, or resistance too high");
  });
});
