import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { readAddress, writeAddress, type AddressState } from "@/lib/map-state/address-state";

const PLAIN: AddressState = {
  log: "log_abc",
  channel: "margin",
  pass: null,
  row: null,
  stretch: null,
  view: null,
  edges: null,
  cleaned: true,
  ground: [],
  comparison: null,
  timeS: null,
};

/** What hostile text leaves behind: nothing but the defaults. */
const NOTHING = {
  log: null,
  pass: null,
  row: null,
  stretch: null,
  view: null,
  edges: null,
  cleaned: true,
  ground: [],
  comparison: null,
  timeS: null,
};

const read = (text: string) => readAddress(new URLSearchParams(text));

describe("the address", () => {
  it("comes back as it was written, with all it can hold", () => {
    const state: AddressState = {
      log: "log_abc",
      channel: "deviation:margin",
      pass: 12,
      row: 17,
      stretch: { pass: 12, fromM: 40.25, toM: 96.5 },
      view: { longitude: -98.612, latitude: 38.417, zoom: 17.25 },
      // 40 and 110 lbf below and above 0 (NIST SP 811, pound-force).
      edges: [-177.928865, 0, 489.304378],
      cleaned: false,
      ground: ["swaths", "skips"],
      comparison: { mode: "side", channel: "other:seed meter, %", logId: "log_def" },
      timeS: 5400.5,
    };
    expect(readAddress(new URLSearchParams(writeAddress(state).toString()))).toEqual(state);
  });

  it("comes back the same whatever of it is set", () => {
    const places = fc.integer({ min: 0, max: 99_999_999 }).map((number) => number / 100);
    const state = fc.record({
      pass: fc.integer({ min: 1, max: 999_999_999 }),
      row: fc.option(fc.integer({ min: 1, max: 200 }), { nil: null }),
      span: fc.option(fc.uniqueArray(places, { minLength: 2, maxLength: 2 }), { nil: null }),
      timeS: fc.option(
        fc.integer({ min: 0, max: 999_999_999 }).map((number) => number / 10),
        { nil: null },
      ),
      comparison: fc.option(
        fc.record({
          mode: fc.constantFrom("swipe" as const, "side" as const),
          channel: fc.constantFrom("depth", "rowSpeed", "deviation:downforce", "other:a&b=c#?"),
          logId: fc.option(fc.stringMatching(/^[\w-]{1,64}$/), { nil: null }),
        }),
        { nil: null },
      ),
    });
    fc.assert(
      fc.property(state, ({ span, ...parts }) => {
        const [fromM = 0, toM = 0] = (span ?? []).toSorted((a, b) => a - b);
        const whole = { ...PLAIN, ...parts, stretch: span ? { pass: parts.pass, fromM, toM } : null };
        expect(readAddress(new URLSearchParams(writeAddress(whole).toString()))).toEqual(whole);
      }),
    );
  });

  it("does not write a stretch of a pass that is no longer unrolled", () => {
    const search = writeAddress({ ...PLAIN, pass: 3, stretch: { pass: 2, fromM: 1, toM: 2 } });
    expect(search.has("brush")).toBe(false);
  });

  it("leaves out what makes no sense", () => {
    expect(read("channel=../x&pass=-3&row=0&view=1,2&edges=5,4&ground=moon,overlap")).toEqual({
      ...NOTHING,
      ground: ["overlap"],
    });
  });

  it.each([
    "pass=4&brush=9,2",
    "pass=4&brush=5,5",
    "pass=4&brush=1",
    "pass=4&brush=1,2,3",
    "pass=4&brush=-1,5",
    "pass=4&brush=NaN,Infinity",
    "pass=4&brush=0x10,0x20",
    "pass=4&brush=1,99999999999",
  ])("takes no stretch from %s", (text) => {
    expect(read(text).stretch).toBeNull();
  });

  it("takes no stretch where no pass is named", () => {
    expect(read("brush=1,2").stretch).toBeNull();
  });

  it.each(["", "-1", "1e3", "NaN", "Infinity", " 5", "5;drop", "999999999999", "<b>5</b>"])(
    "takes no time from %j",
    (text) => {
      expect(readAddress(new URLSearchParams({ time: text })).timeS).toBeNull();
    },
  );

  it.each([
    { compare: "blend", with: "margin" },
    { compare: "swipe" },
    { compare: "swipe", with: "../../etc" },
    { compare: "swipe", with: "__proto__" },
    { compare: "toString", with: "margin" },
  ])("takes no comparison from %j", (query) => {
    expect(readAddress(new URLSearchParams(query as Record<string, string>)).comparison).toBeNull();
  });

  it("compares with the same log where the other's name is no name", () => {
    expect(read("compare=swipe&with=depth&withLog=../../x").comparison).toEqual({
      mode: "swipe",
      channel: "depth",
      logId: null,
    });
  });

  it("survives any text at all", () => {
    const names = ["pass", "row", "brush", "view", "edges", "ground", "compare", "with", "withLog", "time", "channel"];
    fc.assert(
      fc.property(fc.array(fc.tuple(fc.constantFrom(...names), fc.string())), (pairs) => {
        const { stretch, timeS, comparison } = readAddress(new URLSearchParams(pairs));
        expect(stretch == null || stretch.fromM < stretch.toM).toBe(true);
        expect(timeS == null || timeS >= 0).toBe(true);
        expect(comparison == null || ["swipe", "side"].includes(comparison.mode)).toBe(true);
      }),
    );
  });
});
