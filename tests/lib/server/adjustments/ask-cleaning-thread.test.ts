import { describe, expect, it } from "vitest";
import { adjustLog } from "@/lib/adjustments/adjust-log";
import { noAdjustments } from "@/lib/adjustments/adjustments";
import { packPlacedLog } from "@/lib/logs/packed-placed-log";
import { askCleaningThread } from "@/lib/server/adjustments/ask-cleaning-thread";
import { adjustedAnswers } from "@/lib/server/adjustments/adjusted-answers";
import { makePlaced, rulesWith } from "@/tests/lib/cleaning/make-placed";
import { straightTrack } from "@/tests/support/make-log";

const placed = makePlaced({
  records: straightTrack({ from: [0, 0], headingDeg: 0, records: 60 }),
  channels: [{ id: "margin", value: (record, row) => 400 + ((record * 7 + row * 13) % 23) }],
});
const adjustments = {
  delaysS: { margin: 0.4 },
  cleaning: rulesWith({ "start-ramp": { on: true, distanceM: 5.2, timeS: 0 } }),
};
const BUILT = { BUILD_DIR: process.env.BUILD_DIR ?? "build" };
const task = { logKey: "log_one:1", packed: packPlacedLog(placed), adjustments };

describe("the cleaning thread", () => {
  it("that cannot be started refuses what waits, and does not stand in the way of the next", async () => {
    const lost = askCleaningThread({ BUILD_DIR: "nowhere" }, { ...task, kind: "left-out" });
    await expect(lost).rejects.toThrow();
    expect(await askCleaningThread(BUILT, { ...task, kind: "left-out" })).not.toBeNull();
  });

  it("answers as the same work done here", async () => {
    const here = adjustLog(placed, adjustments);
    expect(await askCleaningThread(BUILT, { ...task, kind: "left-out" })).toEqual(here.cleaned);
    const answers = await askCleaningThread(BUILT, { ...task, kind: "answers" });
    expect(answers).toEqual(adjustedAnswers(here.placed));
    const asRead = await askCleaningThread(BUILT, { ...task, kind: "left-out", adjustments: noAdjustments() });
    expect(asRead).toBeNull();
  });

  it("answers many that ask at once, each with its own", async () => {
    const metres = [1.2, 2.2, 3.2, 4.2, 5.2];
    const counts = await Promise.all(
      metres.map((distanceM) =>
        askCleaningThread(BUILT, {
          ...task,
          kind: "counts",
          adjustments: { delaysS: {}, cleaning: rulesWith({ "start-ramp": { on: true, distanceM, timeS: 0 } }) },
        }),
      ),
    );
    const records = counts.map(({ items }) => items.find((item) => item.code === "start-ramp")!.records);
    // A record every half metre, the first at 0: 0, 0.5 and 1 lie within 1.2 m.
    expect(records).toEqual([3, 5, 7, 9, 11]);
  });

  it("refuses a task that goes wrong with its reason, and takes the next", async () => {
    const broken = { ...task, packed: { ...task.packed, passes: [] as never, log: undefined as never } };
    await expect(askCleaningThread(BUILT, { ...broken, kind: "counts" })).rejects.toThrow("cleaning thread");
    expect(await askCleaningThread(BUILT, { ...task, kind: "left-out" })).not.toBeNull();
  });
});
