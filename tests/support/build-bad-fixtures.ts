import { zipSync } from "fflate";
import type { MachineLog } from "@/lib/logs/machine-log";
import { keepFirstRecords } from "@/lib/simulator/benchmark-log";
import { writeWideCsv } from "@/lib/simulator/writers/write-csv";
import { writeShapefileZip } from "@/lib/simulator/writers/write-shapefile";
import type { Fixture } from "@/tests/support/build-fixtures";

/** Enough records to be a log, few enough to see the fault. */
const RECORDS = 60;
/** Uncompressed bytes of the inflating archive: a thousand times what lies on the disk. */
const BOMB_BYTES = 64 * 1024 * 1024;
const ZIP_OPTIONS = { mtime: new Date("2026-09-24T12:00:00"), level: 9 } as const;

/** Files that a reader must refuse, or read with a note, each named after its fault. */
export function buildBadFixtures(log: MachineLog): Fixture[] {
  const short = keepFirstRecords(log, RECORDS);
  return [...textFaults(short), ...columnFaults(short), ...archiveFaults(short)];
}

// kernel: the parts of one bad fixture
function bad(oddity: string, fileName: string, content: string | Uint8Array, story: string): Fixture {
  return { folder: `bad/${oddity}`, fileName, content, story, truth: null };
}

function textFaults(log: MachineLog): Fixture[] {
  const lines = writeWideCsv(log).split("\n");
  const ragged = lines.map((line, index) => {
    if (index === 11) return line.split(",").slice(0, 9).join(",");
    return index === 20 ? `${line},,17,unexpected` : line;
  });
  const letter =
    "Dear Wren,\n\nthe barley is in. We stopped early on Wednesday; the rest of East quarter follows tomorrow.\n" +
    "Please mind the gate.\n\nSee you at the weigh house.\n";
  return [
    bad("empty", "input.csv", "", "a file of 0 bytes"),
    bad("header-only", "input.csv", `${lines[0]}\n`, "column names and not one record"),
    bad("not-a-log", "input.csv", letter, "a letter that somebody named .csv"),
    bad("ragged-rows", "input.csv", ragged.join("\n"), "line 12 has 9 fields, line 21 has 3 too many"),
  ];
}

function columnFaults(log: MachineLog): Fixture[] {
  const nowhere = { longitude: log.longitude.slice(), latitude: log.latitude.slice() };
  for (const record of [4, 5, 17]) {
    nowhere.longitude[record] = 0;
    nowhere.latitude[record] = 0;
  }
  const repeated = log.timeMs.slice();
  for (const record of [10, 11, 30]) repeated[record] = repeated[record - 1] ?? NaN;
  const unknown = writeWideCsv(log).replaceAll(/(Downforce row \d+) \(N\)/g, "$1 (clicks)");
  return [
    bad(
      "swapped-latitude-longitude",
      "input.csv",
      writeWideCsv({ ...log, longitude: log.latitude, latitude: log.longitude }),
      "the longitude column holds latitudes and the other way round",
    ),
    bad("missing-position", "input.csv", dropColumns(writeWideCsv(log), [1, 2]), "no longitude or latitude column"),
    bad("zero-position", "input.csv", writeWideCsv({ ...log, ...nowhere }), "lines 6, 7 and 19 stand at 0,0"),
    bad(
      "duplicate-times",
      "input.csv",
      writeWideCsv({ ...log, timeMs: repeated }),
      "lines 12, 13 and 32 repeat the time of the line before",
    ),
    bad("unknown-unit", "input.csv", unknown, "downforce in `clicks`, a unit nobody knows"),
  ];
}

function dropColumns(csv: string, dropped: readonly number[]): string {
  const keep = (line: string): string =>
    line
      .split(",")
      .filter((_, index) => !dropped.includes(index))
      .join(",");
  return csv.split("\n").map(keep).join("\n");
}

function archiveFaults(log: MachineLog): Fixture[] {
  const whole = writeShapefileZip(log, "seeding");
  const text = new TextEncoder().encode("outside");
  const bomb = { "seeding.shp": new Uint8Array(100), "seeding.dbf": new Uint8Array(BOMB_BYTES) };
  const slip = { "../../outside.shp": text, "/absolute.dbf": text, "..\\windows.shx": text };
  return [
    bad("truncated-zip", "input.zip", whole.slice(0, Math.floor(whole.length * 0.6)), "a zip cut off at 60 %"),
    bad("zip-bomb-small", "input.zip", zipSync(bomb, ZIP_OPTIONS), "64 MB of zeros in some 65 kB"),
    bad("zip-slip-names", "input.zip", zipSync(slip, ZIP_OPTIONS), "entry names that lead out of the folder"),
  ];
}
