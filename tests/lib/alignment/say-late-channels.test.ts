import { describe, expect, it } from "vitest";
import { LATE_CHANNEL, ROWS_DISPLACED, sayLateChannels } from "@/lib/alignment/say-late-channels";

const told = {
  channel: "margin",
  state: "estimated" as const,
  delayS: 1.5,
  delayIntervalS: [1.3, 1.7] as [number, number],
  distanceM: null,
  distanceIntervalM: null,
  separable: false,
  applied: null,
};
const say = (change: Partial<Parameters<typeof sayLateChannels>[0][number]>) =>
  sayLateChannels([{ ...told, ...change }], () => "Margin");

describe("notes on late channels", () => {
  it("say how late, with the interval, and whether it may be a distance", () => {
    expect(say({})).toEqual([
      {
        code: LATE_CHANNEL,
        count: 1,
        message:
          "Margin seems logged 1.5 s late (1.3 to 1.7 s), if it is a delay and not a distance: see the delay of the " +
          "channels under cleaning.",
      },
    ]);
    expect(say({ separable: true })[0]!.message).toContain("late (1.3 to 1.7 s): see");
  });

  it("say early for a delay below 0", () => {
    expect(say({ delayS: -1, delayIntervalS: [-1.2, -0.9] })[0]!.message).toContain("1.0 s early (0.9 to 1.2 s)");
  });

  it("count what the adjustments take out: mended is silent, half mended says what is left", () => {
    expect(say({ applied: 1.5 })).toEqual([]);
    expect(say({ applied: 1.2 })).toEqual([]);
    expect(say({ applied: 0.5 })[0]!.message).toContain("Margin still seems logged 1.0 s late (0.8 to 1.2 s)");
    expect(say({ applied: 3 })[0]!.message).toContain("1.5 s early (1.3 to 1.7 s)");
  });

  it("say nothing of short delays, of intervals that hold none, and of refusals", () => {
    expect(say({ delayS: 0.4, delayIntervalS: [0.3, 0.5] })).toEqual([]);
    expect(say({ delayS: 0.6, delayIntervalS: [-0.1, 1.3] })).toEqual([]);
    expect(say({ state: "refused", delayS: null, delayIntervalS: null })).toEqual([]);
  });

  it("say where the rows themselves seem displaced", () => {
    const displaced = { delayS: 0, delayIntervalS: [-0.2, 0.2] as [number, number], separable: true };
    const ahead = say({ ...displaced, distanceM: -1.2, distanceIntervalM: [-1.6, -0.8] });
    expect(ahead).toMatchObject([{ code: ROWS_DISPLACED }]);
    expect(ahead[0]!.message).toContain("By margin, the rows seem to run 1.2 m (0.8 to 1.6 m) further forward");
    expect(say({ ...displaced, distanceM: 0.7, distanceIntervalM: [-0.1, 1.5] })).toEqual([]);
  });
});
