import { describe, expect, it } from "vitest";
import { createBenchmarkLog, writeBenchmarkCsv } from "@/lib/simulator/benchmark-log";

describe("createBenchmarkLog", () => {
  it.each([
    ["small", 2_000, 24],
    ["large", 60_000, 48],
  ] as const)("makes the %s log with exactly %i records of %i rows and three channels", (size, records, rows) => {
    const log = createBenchmarkLog(size);
    expect(log.channels.map((channel) => channel.values.length)).toEqual(Array(3).fill(records * rows));
    expect([log.timeMs.length, log.longitude.length, log.working?.length]).toEqual(Array(3).fill(records));
  });

  it("writes it piece by piece, one line a record", () => {
    let pieces = 0;
    let lines = 0;
    let longest = 0;
    for (const piece of writeBenchmarkCsv("small")) {
      pieces += 1;
      lines += piece.split("\n").length - 1;
      longest = Math.max(longest, piece.length);
    }
    expect(lines).toBe(2_001);
    expect(pieces).toBeGreaterThan(5);
    expect(longest).toBeLessThan(300_000);
  });
});
