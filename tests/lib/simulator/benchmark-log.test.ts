import { describe, expect, it } from "vitest";
import { BENCHMARK_STYLE, createBenchmarkLog } from "@/lib/simulator/benchmark-log";
import { writeWideCsvChunks } from "@/lib/simulator/writers/write-csv";

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
    for (const piece of writeWideCsvChunks(createBenchmarkLog("small"), BENCHMARK_STYLE)) {
      pieces += 1;
      lines += piece.split("\n").length - 1;
      longest = Math.max(longest, piece.length);
    }
    expect(lines).toBe(2_001);
    expect(pieces).toBeGreaterThan(5);
    expect(longest).toBeLessThan(300_000);
  });
});
