import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { resolveChannel, resolveChannelOrReason } from "@/lib/channels/resolve-channel";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

const records = straightTrack({ from: [0, 0], headingDeg: 0, records: 40 }).map((record, i) => ({
  ...record,
  timeS: 0.5 * i,
}));

function place(change: (timeMs: Float64Array) => void = () => undefined) {
  const log = makeLog({ records, channels: [{ id: "margin", value: () => 450 }] });
  const built = buildLog(log, makeSeeder({}));
  if (!built.ok) throw new Error(built.error.message);
  change(built.value.placed.log.timeMs);
  return built.value.placed;
}

describe("the time a record was worked at", () => {
  it("counts from the log's first time, one value for all rows, missing outside passes", () => {
    const placed = place();
    placed.passOf[3] = 0;
    const time = resolveChannel(placed, "time")!;
    expect(time).toMatchObject({ unit: "s", rows: 1, perRow: false });
    expect(Array.from(time.values.slice(0, 6))).toEqual([0, 0.5, 1, NaN, 2, 2.5]);
    expect(time.values).toHaveLength(40);
  });

  it("is refused in words where no record has a time", () => {
    const reason = resolveChannelOrReason(
      place((timeMs) => timeMs.fill(NaN)),
      "time",
    );
    expect(reason.ok ? "" : reason.error).toMatch(/does not say when/);
  });
});
