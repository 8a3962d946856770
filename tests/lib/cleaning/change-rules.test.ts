import { describe, expect, it } from "vitest";
import { changeRules } from "@/lib/cleaning/change-rules";
import { chosenRules, defaultRules } from "@/lib/cleaning/default-rules";
import { CLEANING_CODES, ruleFacts } from "@/lib/cleaning/rule-catalogue";
import { CleaningRulesBody, CleaningRulesChange } from "@/lib/schemas/cleaning";

describe("rules", () => {
  it("begin with what places need and nothing else, every number within its own bounds", () => {
    const rules = CleaningRulesBody.parse(defaultRules());
    expect(CLEANING_CODES.filter((code) => rules[code].on)).toEqual(["no-position", "impossible-step", "not-working"]);
    expect(chosenRules(rules)).toEqual([]);
  });

  it("carry the unit of every number in its name", () => {
    const names = CLEANING_CODES.flatMap((code) => Object.keys(ruleFacts(code).numbers));
    const bare = names.filter((name) => !/(M|N|S|Mps|Mps2|Deg|PerM2|KgPerS|Fraction|Records|Spreads)$/.test(name));
    expect(bare).toEqual([]);
  });

  it("keep what a change does not name", () => {
    const changed = changeRules(
      defaultRules(),
      CleaningRulesChange.parse({ "end-ramp": { on: true }, speed: { maxMps: 5 } }),
    );
    expect(changed).toEqual({
      ok: true,
      value: {
        ...defaultRules(),
        "end-ramp": { ...defaultRules()["end-ramp"], on: true },
        speed: { ...defaultRules().speed, maxMps: 5 },
      },
    });
  });

  it("refuse what makes no sense by the path of it", () => {
    const paths = (change: unknown) => {
      const changed = changeRules(defaultRules(), CleaningRulesChange.parse(change));
      return changed.ok ? [] : changed.error.map((fault) => fault.path);
    };
    expect(paths({ "not-working": { on: false } })).toEqual(["rules.not-working.on"]);
    expect(paths({ speed: { minMps: 6 } })).toEqual(["rules.speed.minMps"]);
    expect(paths({ "physical-range": { marginMaxN: -501 } })).toEqual(["rules.physical-range.marginMinN"]);
    expect(CleaningRulesChange.safeParse({ "sensor-stuck": { unchangedRecords: 2.5 } }).success).toBe(false);
    expect(CleaningRulesChange.safeParse({ "short-pass": { on: "yes" } }).success).toBe(false);
  });
});
