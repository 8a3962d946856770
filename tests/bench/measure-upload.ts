import { copyByGdal } from "@/tests/bench/baselines";
import type { BenchContext } from "@/tests/bench/bench-context";
import type { BenchFile } from "@/tests/bench/bench-files";
import { peakBytes, processorS, resetPeak, watchedProcesses, type WatchedProcess } from "@/tests/bench/process-usage";
import { medianOf, printGoal, printRatio, type Pair } from "@/tests/bench/ratios";
import { uploadToReady } from "@/tests/bench/upload-to-ready";

export interface UploadBench {
  file: BenchFile;
  label: string;
  /** Milliseconds of what the upload is measured against, run right after it. */
  base(): Promise<number>;
  baseName: string;
  atMost: number;
  rounds: number;
  /** Also measure `ogr2ogr` of the same file and the worker's memory. */
  inFull?: boolean;
}

/** One pair after another; the first of each is left out (caches, compilation). Leaves the last log in place. */
export async function measureUpload(context: BenchContext, bench: UploadBench): Promise<string> {
  const { file, label, baseName } = bench;
  const watched = watchProcesses();
  const ready: Pair[] = [];
  const posts: Pair[] = [];
  const gdal: Pair[] = [];
  const peaks: number[] = [];
  let last = "";
  // Making the file held this process up; connections that the server closed meanwhile are noticed now.
  await new Promise((resolve) => setTimeout(resolve, 100));
  for (let round = 0; round <= bench.rounds; round++) {
    watched.begin();
    const { ms, postMs, logId } = await uploadToReady(context, file);
    const peak = watched.end(round > 0);
    last = logId;
    const base = await bench.base();
    const gdalMs = bench.inFull ? await copyByGdal(context, file) : NaN;
    if (round === 0) continue;
    ready.push({ ours: ms, base });
    posts.push({ ours: postMs, base });
    gdal.push({ ours: ms, base: gdalMs });
    peaks.push(peak);
  }
  const megabytes = (file.bytes / 1e6).toFixed(1);
  printGoal(`${label} (${megabytes} MB), upload to ready / ${baseName}`, ready, { atMost: bench.atMost });
  printRatio(
    `  of that, answering the upload / ${baseName}`,
    medianOf(posts.map((one) => one.ours / one.base)).toFixed(2),
  );
  printRatio("  processor seconds", watched.words());
  if (bench.inFull) {
    printGoal("  upload to ready / ogr2ogr into PostgreSQL", gdal, { atMost: 1 / 3 });
    const memory = peaks.map((ours) => ({ ours, base: file.bytes }));
    const mebibytes = Math.round(medianOf(peaks) / 1024 / 1024);
    printGoal("  peak memory of the worker process / file size", memory, { atMost: 4, note: `${mebibytes} MiB` });
  }
  return last;
}

/** Processor time of what one upload keeps busy, and the worker's highest memory. */
function watchProcesses() {
  const pids = watchedProcesses();
  const names = Object.keys(pids) as WatchedProcess[];
  const used = new Map(names.map((name) => [name, [] as number[]]));
  let before = new Map<WatchedProcess, number>();
  return {
    begin() {
      resetPeak(pids.worker);
      before = new Map(names.map((name) => [name, processorS(pids[name])]));
    },
    end(counts: boolean): number {
      for (const name of names) if (counts) used.get(name)?.push(processorS(pids[name]) - (before.get(name) ?? 0));
      return peakBytes(pids.worker);
    },
    words: () => names.map((name) => `${name} ${medianOf(used.get(name) ?? []).toFixed(2)}`).join(", "),
  };
}
