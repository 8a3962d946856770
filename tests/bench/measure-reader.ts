import { readLog } from "@/lib/ingest";
import { diskSource, type BenchFile } from "@/tests/bench/bench-files";
import { printGoal, type Pair } from "@/tests/bench/ratios";

export interface ReaderBench {
  file: BenchFile;
  label: string;
  base(): Promise<number>;
  atMost: number;
  rounds: number;
}

/** From a file on disk to typed arrays, in this process, against `psql \copy` of the same readings as wide CSV. */
export async function measureReader({ file, label, base, atMost, rounds }: ReaderBench): Promise<void> {
  const pairs: Pair[] = [];
  for (let round = 0; round <= rounds; round++) {
    const started = performance.now();
    const read = await readLog(diskSource(file), file.mapping);
    const ours = performance.now() - started;
    if (!read.ok) throw new Error(read.error.message);
    const pair = { ours, base: await base() };
    if (round > 0) pairs.push(pair);
  }
  const megabytes = (file.bytes / 1e6).toFixed(1);
  printGoal(`${label} (${megabytes} MB), read into typed arrays / psql \\copy, wide`, pairs, { atMost });
}
