import { describe, expect, it } from "vitest";
import { findLeftOut, leaveOut } from "@/lib/adjustments/adjust-log";
import { countRules } from "@/lib/cleaning/count-rules";
import { reasonOf } from "@/lib/cleaning/left-out";
import { CLEANING_CODES, type CleaningCode, type CleaningRules } from "@/lib/cleaning/rule-catalogue";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { makePlaced, maskOf, rulesWith } from "@/tests/lib/cleaning/make-placed";
import { straightTrack } from "@/tests/support/make-log";

/** One pass of 40 records of 4 rows in margin and downforce; row 2 has no margin at record 3. */
const placed = makePlaced({
  records: straightTrack({ from: [0, 0], headingDeg: 0, records: 40 }),
  channels: [
    {
      id: "margin",
      value: (record, row) => (record === 3 && row === 2 ? NaN : record === 20 && row === 1 ? 9000 : 400),
    },
    { id: "downforce", value: () => 900 },
  ],
});

function count(rules: CleaningRules, of: PlacedLog = placed) {
  const counts = countRules(of, rules, (code) => maskOf(of, code, rules[code]));
  return { ...counts, of: (code: CleaningCode) => counts.items.find((item) => item.code === code)! };
}

describe("counts of rules", () => {
  it("are worked by hand: 319 readings, the first 8 records hold 63 of them", () => {
    const counts = count(rulesWith({ "start-ramp": { on: true, distanceM: 3.8, timeS: 0 } }));
    expect(counts.total).toEqual({ logged: 319, before: 319, after: 256 });
    expect(counts.of("start-ramp")).toMatchObject({ records: 8, readings: 63, takenOutFirst: 63, share: 63 / 319 });
    expect(counts.of("start-ramp").before.readings).toBe(319);
    expect(counts.of("start-ramp").after.readings).toBe(256);
  });

  it("say of a rule that is off what it would take out, and leave the others their own", () => {
    const counts = count(rulesWith({ "start-ramp": { distanceM: 3.8, timeS: 0 } }));
    expect(counts.of("start-ramp")).toMatchObject({ on: false, readings: 63, takenOutFirst: 63 });
    expect(counts.of("end-ramp").before.readings).toBe(319);
    expect(counts.total.after).toBe(319);
  });

  it("give each reading to the first rule in order that takes it", () => {
    const ramps = { on: true, distanceM: 12.3, timeS: 0 };
    const counts = count(
      rulesWith({ "start-ramp": ramps, "end-ramp": ramps, "physical-range": { on: true }, turning: { on: true } }),
    );
    // 25 records from either end of 40: the 10 in the middle belong to both, and go with the start.
    expect(counts.of("start-ramp")).toMatchObject({ records: 25, readings: 199, takenOutFirst: 199 });
    expect(counts.of("end-ramp")).toMatchObject({ records: 25, readings: 200, takenOutFirst: 120 });
    expect(counts.of("physical-range")).toMatchObject({ records: 1, readings: 1, takenOutFirst: 0 });
    expect(counts.total.after).toBe(0);
    const sum = counts.items.filter((item) => item.on).reduce((n, item) => n + item.takenOutFirst, 0);
    expect(counts.total.logged - sum).toBe(counts.total.after);
  });

  it("agree with what is left out, rule by rule", () => {
    const rules = rulesWith({
      "start-ramp": { on: true, distanceM: 3.8, timeS: 0 },
      "physical-range": { on: true },
      "short-pass": { on: true, minLengthM: 5, minRecords: 1 },
    });
    const counts = count(rules);
    const out = findLeftOut(placed, rules)!;
    const cleaned = leaveOut(placed, out);
    const kept = cleaned.log.channels.reduce(
      (n, { values }) => n + values.filter((value) => value === value).length,
      0,
    );
    expect(kept).toBe(counts.total.after);
    for (const [order, code] of CLEANING_CODES.entries()) {
      if (!rules[code].on || counts.of(code).fixed !== null) continue;
      let first = 0;
      for (const channel of placed.log.channels) {
        channel.values.forEach((value, at) => {
          if (value === value && reasonOf(out, channel, Math.floor(at / 4), at % 4) === order + 1) first++;
        });
      }
      expect({ code, first }).toEqual({ code, first: counts.of(code).takenOutFirst });
    }
  });

  it("count readings outside passes to the rules that keep them out", () => {
    const records = straightTrack({ from: [0, 0], headingDeg: 0, records: 60 });
    const lifted = makePlaced({
      records: records.map((record, i) => ({ ...record, working: i < 40 })),
      channels: [{ id: "margin", value: () => 400 }],
    });
    const counts = count(rulesWith({}), lifted);
    expect(counts.total).toEqual({ logged: 240, before: 160, after: 160 });
    expect(counts.of("not-working")).toMatchObject({ records: 20, readings: 80, takenOutFirst: 80, share: 80 / 240 });
    expect(counts.of("start-ramp").before.readings).toBe(160);
  });
});
