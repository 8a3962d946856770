import type { Adjustments } from "@/lib/adjustments/adjustments";
import type { FlagCode } from "@/lib/cleaning/flags";
import type { ExportColumn, ExportLevel, ExportShape, ExportTable } from "@/lib/export/export-table";
import type { LogMapping } from "@/lib/ingest/mapping";
import type { LogNote } from "@/lib/logs/machine-log";
import type { PlacedLog, RowGeometry } from "@/lib/logs/placed-log";
import type { Seeder } from "@/lib/machines/machine";

/** A mapping, and the recipe that it is. */
export type ExportRecipe = LogMapping & { name: string | null; version: number | null };

/** The original: one file, or a set of them, whose `sha256` is then a hash over the sorted hashes of all. */
export interface ExportSource {
  fileName: string;
  bytes: number;
  sha256: string;
  /** Each file as it was sent, in that order. */
  files: { name: string; bytes: number; sha256: string; records: number | null }[];
}

/** What travels beside exported data: where it came from, what it means and how it was made. */
export interface ExportAbout {
  title: string;
  level: ExportLevel;
  shape: ExportShape;
  madeAt: string;
  program: "Coulterbook";
  log: { id: string; name: string; kind: string; version: number; startedAt: string | null; endedAt: string | null };
  source: ExportSource;
  /** The machine as it was when this version was made; null when nobody said. */
  machine: Seeder | null;
  /** Metres: right of the centre line, ahead of the line of rows, width answered for. */
  rows: { isGuessed: boolean; offsetM: number[]; forwardM: number[]; widthM: number[] };
  /** Meaning that a person confirmed of the original file's columns; name and version where it was kept as a recipe. */
  recipe: ExportRecipe | null;
  /** Cleaning rules and delays that the readings are given with; null as they were logged. */
  adjustments: (Adjustments & { revision: number }) | null;
  /** Class edges and the like, for zones. */
  choice: Record<string, unknown> | null;
  coordinates: string;
  method: string[];
  flags: Record<FlagCode, string>;
  notes: LogNote[];
  columns: Pick<ExportColumn, "name" | "shortName" | "unit" | "meaning">[];
  /** Mapping that reads this very table in again, for `PUT /mapping`; null for polygons. */
  readAgain: LogMapping | null;
}

export interface AboutInput extends Pick<
  ExportAbout,
  "log" | "source" | "recipe" | "notes" | "madeAt" | "shape" | "choice" | "adjustments"
> {
  table: ExportTable;
  outline: Pick<PlacedLog, "machine" | "geometry" | "log">;
  readAgain: LogMapping | null;
}

const FLAG_WORDS: Record<FlagCode, string> = {
  "no-position": "The record has no usable position.",
  "duplicate-time": "Same time as the record before.",
  "impossible-step": "The position jumped further than the machine can drive.",
  "not-working": "The log says the machine did not work.",
  "short-pass": "In a pass of under 10 m or 10 records.",
  turning: "The machine turned.",
  "standing-still": "The machine stood still.",
  "hitch-unsettled": "The trailed machine's heading was not known yet.",
  "time-backwards": "Earlier than the record before.",
  "jack-knife": "The angle at the hitch was past what can be worked out.",
  reversing: "The machine ran backwards; a trailed machine's row places are a guess there.",
};

const PLACE_METHOD =
  "A row stands at the antenna's position moved by the machine's measures along the implement's heading: " +
  "behind the antenna, right of the centre line, ahead of the line of rows. Work is done in a transverse Mercator plane " +
  "about the log on WGS 84.";

const METHODS: Record<ExportLevel, string[]> = {
  readings: [
    PLACE_METHOD,
    "Readings are those of the file in SI units; nothing is smoothed, averaged or deleted. Flags tell of doubts.",
    "Records in no pass (pass = 0: not working, without a usable position, or between passes) keep their readings in this " +
      "file and count in no statistic. To count as the statistics do, take only records with pass > 0.",
    "resistanceN is force applied + mass of the row unit times 9.80665 m/s2 - margin; missing where the margin is not above 0.",
  ],
  zones: [
    PLACE_METHOD,
    "A zone is a stretch of one row in one class, after smoothing over half the least length, hysteresis of a twentieth of " +
      "the narrowest class, and merging of stretches shorter than the least length with a neighbour.",
    "Mean (weighted by distance), least and greatest are of the raw readings.",
  ],
  swaths: [
    PLACE_METHOD,
    "A swath is the ground between the outer edges of the outermost rows over one pass, its outline within 0.1 m.",
  ],
};

const ADJUSTED_METHOD =
  "Readings are given with the adjustments below: a channel with a delay is read that many seconds later (the nearest record " +
  "of the same pass), then each cleaning rule that was switched on leaves out readings, which are missing here and stay in the " +
  "log. Rules that are always on take out no reading; they keep records out of passes.";

/** Puts together what is known about an export. */
export function describeExport(input: AboutInput): ExportAbout {
  const { table, outline } = input;
  const { offsetM, forwardM, widthM } = outline.geometry as RowGeometry;
  return {
    title: `${input.log.name}: ${table.level}`,
    level: table.level,
    shape: input.shape,
    madeAt: input.madeAt,
    program: "Coulterbook",
    log: input.log,
    source: input.source,
    machine: outline.machine,
    rows: { isGuessed: outline.machine === null, offsetM: [...offsetM], forwardM: [...forwardM], widthM: [...widthM] },
    recipe: input.recipe,
    choice: input.choice,
    coordinates: "Longitude and latitude in degrees, WGS 84 (OGC:CRS84).",
    adjustments: input.adjustments,
    method: input.adjustments ? [...METHODS[table.level], ADJUSTED_METHOD] : METHODS[table.level],
    flags: FLAG_WORDS,
    notes: input.notes,
    columns: table.columns.map(({ name, shortName, unit, meaning }) => ({ name, shortName, unit, meaning })),
    readAgain: input.readAgain,
  };
}
