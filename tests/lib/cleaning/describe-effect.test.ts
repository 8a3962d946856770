// Hand-worked: four rows, a reading every half metre; every reading stands for the same distance.
import { describe, expect, it } from "vitest";
import { leaveOut, findLeftOut } from "@/lib/adjustments/adjust-log";
import { describeEffect, summariseChannels } from "@/lib/cleaning/describe-effect";
import { makePlaced, rulesWith } from "@/tests/lib/cleaning/make-placed";
import { straightTrack } from "@/tests/support/make-log";

describe("the effect of rules", () => {
  const placed = makePlaced({
    records: straightTrack({ from: [0, 0], headingDeg: 0, records: 40 }),
    channels: [{ id: "margin", value: (record) => (record < 8 ? 100 : record % 2 === 0 ? 400 : 500) }],
  });
  const asLogged = summariseChannels(placed);
  const rules = rulesWith({ "start-ramp": { on: true, distanceM: 3.8, timeS: 0 } });
  const cleaned = leaveOut(placed, findLeftOut(placed, rules));
  const [margin] = describeEffect(asLogged, summariseChannels(cleaned));

  it("is told as logged: 32 readings of 100, 128 of 400 and 500 in turn", () => {
    // Mean (8 * 100 + 16 * 400 + 16 * 500) / 40 = 380; variance (8 * 280^2 + 16 * 20^2 + 16 * 120^2) / 40 = 21600.
    expect(margin!.asLogged).toMatchObject({ n: 160, p05: 100, shareUnderTarget: null });
    expect(margin!.asLogged.mean).toBeCloseTo(380, 3);
    expect(margin!.asLogged.sd).toBeCloseTo(Math.sqrt(21600), 3);
  });

  it("and without the first 8 records: mean 450, spread 50", () => {
    expect(margin!.cleaned).toMatchObject({ n: 128, p05: 400, p95: 500 });
    expect(margin!.cleaned.mean).toBeCloseTo(450, 3);
    expect(margin!.cleaned.sd).toBeCloseTo(50, 3);
  });
});
