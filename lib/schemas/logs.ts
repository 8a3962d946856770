import { z } from "zod";
import { plainText } from "@/lib/schemas/plain-text";
import { OverlapByCause } from "@/lib/schemas/coverage";
import { Id, Instant, listOf, NullableNumber } from "@/lib/schemas/listing";
import { PlaceGeometry } from "@/lib/schemas/geometry";

export const LOG_STATUSES = ["queued", "reading", "needs-mapping", "building", "ready", "failed"] as const;
export const LogStatus = z.enum(LOG_STATUSES);
export type LogStatus = z.infer<typeof LogStatus>;

export const LogErrorBody = z.object({
  code: z.string(),
  message: z.string(),
  line: z.number().int().optional(),
  column: z.string().optional(),
});
export const LogNoteBody = z.object({
  code: z.string(),
  count: z.number().int(),
  firstLine: z.number().int().optional(),
  message: z.string(),
  /** Of a log that came in several files: the one it speaks of, to which `firstLine` belongs. */
  file: z.string().optional(),
  /** Another field that the note speaks of. */
  fieldId: z.string().optional(),
});
export const LogCounts = z.object({
  records: z.number().int(),
  rows: z.number().int(),
  readings: z.number().int(),
  flagged: z.number().int(),
  rejected: z.number().int(),
  passes: z.number().int(),
});
export const LogChannelBody = z.object({
  id: z.string(),
  unit: z.string(),
  min: NullableNumber,
  max: NullableNumber,
  perRow: z.boolean(),
});

export const LogFileBody = z.object({
  name: z.string(),
  bytes: z.number().int(),
  sha256: z.string(),
  /** Records read from it; null until it has been read. */
  records: z.number().int().nullable(),
  /** Names of further files of the same upload with these very bytes, which were kept once. */
  copies: z.array(z.string()),
});

export const Log = z.object({
  id: Id,
  fieldId: Id,
  name: z.string(),
  kind: z.enum(["seeding", "harvest", "other"]),
  status: LogStatus,
  progress: z.number().min(0).max(1),
  /** The stage in plain words, e.g. "Placing rows on the ground". */
  stage: z.string(),
  error: LogErrorBody.nullable(),
  notes: z.array(LogNoteBody),
  counts: LogCounts,
  channels: z.array(LogChannelBody),
  startedAt: Instant.nullable(),
  endedAt: Instant.nullable(),
  /** west, south, east, north; west > east across the antimeridian (RFC 7946 5.2). */
  bbox: z.tuple([z.number(), z.number(), z.number(), z.number()]).nullable(),
  machineId: Id.nullable(),
  /** The recipe that it was read with, and which version of it. */
  mappingId: Id.nullable(),
  mappingVersion: z.number().int().nullable().optional(),
  fileName: z.string(),
  fileBytes: z.number().int(),
  /** Of a log in several files: a hash over the hashes of all of them. */
  sha256: z.string(),
  /** The files it was uploaded as, in the order sent; told where one log is asked for. */
  files: z.array(LogFileBody).optional(),
  /** Grows with every new mapping or machine; part of tile addresses. */
  version: z.number().int(),
  /** Of the adjustments in force (cleaning rules, delays); 0 where they change no reading. Part of tile addresses. */
  revision: z.number().int().optional(),
  createdAt: Instant,
  /** Whether whoever asks may delete it. */
  removable: z.boolean().optional(),
});
export type Log = z.infer<typeof Log>;
export const LogList = listOf(Log);

export const LogAccepted = z.object({ id: Id, status: LogStatus });
export const LogPatch = z.object({
  name: plainText(200).min(1).optional(),
  machineId: Id.nullable().optional(),
  /** The field that the log belongs to. */
  fieldId: Id.optional(),
});

/** The machine beside a mapping: null for none, left out to keep the one the log has. */
export const MappingMachine = Id.nullable().optional();

export const ColumnProposal = z.object({
  channel: z.string(),
  row: z.number().int().optional(),
  unit: z.string().nullable(),
  format: z.string().optional(),
  /** Values that seem to stand for "nothing here". */
  missing: z.array(z.number()).optional(),
  confidence: z.number().min(0).max(1),
  reason: z.string(),
});
export const FoundColumnBody = z.object({
  name: z.string(),
  sample: z.array(z.string()),
  min: NullableNumber,
  max: NullableNumber,
  proposal: ColumnProposal.nullable(),
  /** Unit and row that the header names though not what the column is. */
  hint: z.object({ unit: z.string().optional(), row: z.number().int().optional() }).optional(),
  /** The proposal as a sentence a person can check. */
  words: z.string(),
});
export const CrsCandidateBody = z.object({ crs: z.string(), words: z.string() });
/** Where the rows of the machine stand by the file's own description of it; row 1 first. */
export const LoggedDeviceBody = z.object({
  name: z.string(),
  rows: z.number().int(),
  /** Middle distance between neighbouring rows, and over the outer edges of all. */
  rowSpacingM: z.number(),
  widthM: z.number(),
  /** Right of the machine's own reference point. */
  rowOffsetsM: z.array(z.number()),
  /** Ahead of the mean of the rows. */
  rowForwardM: z.array(z.number()),
  rowWidthsM: z.array(NullableNumber),
  /** Behind the machine's own reference point, which need not be the antenna; null where the file does not say. */
  rowsBehindReferenceM: NullableNumber,
});
/** One of several logs in a file; `layer` of a mapping names its id. */
export const LogLayerBody = z.object({
  id: z.string(),
  label: z.string(),
  records: z.number().int(),
  shape: z.enum(["wide", "long", "single"]),
  crs: z.string().optional(),
  crsCandidates: z.array(CrsCandidateBody).optional(),
  device: LoggedDeviceBody.optional(),
  example: z.array(z.string()).optional(),
  columns: z.array(FoundColumnBody),
});
export const LogColumns = z.object({
  format: z.string(),
  shape: z.enum(["wide", "long", "single"]),
  columns: z.array(FoundColumnBody),
  /** Where the file itself says in which system its easting and northing are. */
  crs: z.string().optional(),
  /** Systems that put the log near its field, best first, where the file does not say. */
  crsCandidates: z.array(CrsCandidateBody).optional(),
  /** Where the file holds several logs: all of them, the longest first; `columns` are those of the first. */
  layers: z.array(LogLayerBody).optional(),
  /** The machine by the file's own description, where it has one. */
  device: LoggedDeviceBody.optional(),
  /** Cells of one record as they stand in the file, in the order of the columns: for reading it out. */
  example: z.array(z.string()).optional(),
  decimalComma: z.boolean().optional(),
  notes: z.array(LogNoteBody),
  /** The mapping in force, once a person or a recipe gave one. */
  mapping: z.unknown().nullable(),
  /** The recipe that gave it, also where it was deleted since. */
  recipe: z.object({ id: Id, name: z.string(), version: z.number().int() }).nullable(),
});
export type LogColumns = z.infer<typeof LogColumns>;

export const PassBody = z.object({
  pass: z.number().int(),
  startedAt: Instant.nullable(),
  endedAt: Instant.nullable(),
  headingDeg: z.number(),
  lengthM: z.number(),
  records: z.number().int(),
  headland: z.boolean(),
});
export type PassBody = z.infer<typeof PassBody>;
export const PassList = listOf(PassBody);

export const PassReadings = z.object({
  channel: z.string(),
  unit: z.string(),
  rows: z.number().int(),
  records: z.number().int(),
  timesS: z.array(NullableNumber),
  distancesM: z.array(z.number()),
  positions: z.array(z.tuple([z.number(), z.number()])),
  values: z.array(z.array(NullableNumber)),
  pass: z.number().int().optional(),
  /** Number of the pass's first record in the log. */
  firstRecord: z.number().int().optional(),
  /** One entry a record: heading and speed of the implement, bits of `FLAGS`. `positions` are where its centre line meets the line of rows. */
  headingsDeg: z.array(NullableNumber).optional(),
  speedsMps: z.array(NullableNumber).optional(),
  flags: z.array(z.number().int()).optional(),
  /** One entry a row: right of the centre line, ahead of the line of rows, and width answered for. */
  rowOffsetsM: z.array(z.number()).optional(),
  rowForwardM: z.array(z.number()).optional(),
  rowWidthsM: z.array(z.number()).optional(),
});
export type PassReadings = z.infer<typeof PassReadings>;

export const RowStatisticsItem = z.object({
  row: z.number().int(),
  n: z.number().int(),
  distanceM: z.number(),
  mean: NullableNumber,
  sd: NullableNumber,
  min: NullableNumber,
  p05: NullableNumber,
  p25: NullableNumber,
  p50: NullableNumber,
  p75: NullableNumber,
  p95: NullableNumber,
  max: NullableNumber,
  shareUnderTarget: NullableNumber,
  shareAtLimit: NullableNumber,
  shareContactLost: NullableNumber,
  longestUnderTargetM: NullableNumber,
  /** Typical difference from the other rows less the median over rows, in the channel's unit; versions of earlier builds do not say. */
  deviation: NullableNumber.optional(),
  deviationZ: NullableNumber,
  flagged: z.boolean(),
  reason: z.string().nullable(),
  /** Of a channel whose readings are names: share of distance under each, by rising code from 1. */
  classShares: z.array(z.number()).optional(),
});
export type RowStatisticsItem = z.infer<typeof RowStatisticsItem>;
export const RowStatisticsBody = z.object({
  channel: z.string(),
  unit: z.string(),
  items: z.array(RowStatisticsItem),
  /** Rows compared among themselves because both sides of the machine stand out alike; versions of earlier builds do not say. */
  wheelTrackRows: z.array(z.number().int()).optional(),
  /** Median over rows of their medians: a row is flagged only where it is 5 % of this away. */
  medianOfRows: NullableNumber.optional(),
});
export type RowStatisticsBody = z.infer<typeof RowStatisticsBody>;

export const CoverageBody = z.object({
  sweptM2: z.number(),
  coveredM2: z.number(),
  overlapM2: z.number(),
  skippedM2: z
    .number()
    .describe("All bare ground closed in by worked ground, slivers too: at least skips.areaM2, square metres"),
  resolutionM: z.number(),
  /** Why ground was worked twice; the areas add up to `overlapM2`. Versions of earlier builds do not say. */
  overlapByCause: z.array(OverlapByCause).optional(),
  /** Pieces of ground left out between worked ground. */
  skips: z
    .object({ count: z.number().int(), areaM2: z.number(), largestM2: z.number() })
    .optional()
    .describe("Pieces of at least 1 m2 among skippedM2; smaller ones are slivers and are not counted here"),
});
export type CoverageBody = z.infer<typeof CoverageBody>;

export const Finding = z.object({
  id: z.string(),
  kind: z.string(),
  severity: z.enum(["ok", "look", "act"]),
  /** In SI units. */
  sentence: z.string(),
  /** The same with `{name}` where a number of `values` stands, so that a screen can say it in the reader's units. */
  sentenceTemplate: z.string().optional(),
  values: z.record(z.string(), z.object({ value: z.number(), unit: z.string() })).optional(),
  value: NullableNumber,
  unit: z.string(),
  interval: z.tuple([z.number(), z.number()]).nullable(),
  confidence: z.string(),
  method: z.string(),
  place: PlaceGeometry.nullable(),
  check: z.string(),
  caution: z.string().nullable(),
  row: z.number().int().nullable().optional(),
});
export type Finding = z.infer<typeof Finding>;

export const VerdictBody = z
  .object({
    rowsUnderTarget: z.array(z.number().int()),
    rowsAtLimit: z.array(z.number().int()),
    /** Whether the lists above could be made; verdicts of earlier builds do not say. */
    known: z.object({ underTarget: z.boolean(), atLimit: z.boolean() }).optional(),
    weight: z.object({
      headroomN: z.object({ p05: z.number(), p50: z.number() }).nullable(),
      shareLiftedM2: NullableNumber,
      state: z.enum(["enough", "short", "unknown"]),
      missing: z.array(z.string()).optional(),
    }),
    findings: z.array(Finding),
    leftOutShare: z
      .number()
      .min(0)
      .max(1)
      .optional()
      .describe("Share of the readings in passes that the cleaning rules leave out of this verdict; 0 as logged"),
  })
  .loose();
export type VerdictBody = z.infer<typeof VerdictBody>;

/** A whole log at a glance: passes end to end in time order, squeezed into `columns` columns. */
export const LogOverview = z.object({
  channel: z.string(),
  unit: z.string(),
  rows: z.number().int(),
  columns: z.number().int(),
  /** Columns `from` up to and without `to` belong to the pass. */
  passes: z.array(z.object({ pass: z.number().int(), from: z.number().int(), to: z.number().int() })),
  /** `[[row 1 ...], ...]`: distance-weighted means of what each column covers. */
  values: z.array(z.array(NullableNumber)),
  /** Equal bins of all readings: how many, and over how many metres of row. */
  histogram: z.object({
    minimum: z.number(),
    maximum: z.number(),
    counts: z.array(z.number().int()),
    distancesM: z.array(z.number()).optional(),
  }),
  /** Metres of row at each value, value = offset + code * step: what shares of distance are worked out from. */
  distribution: z.object({
    offset: z.number(),
    step: z.number(),
    codes: z.array(z.number().int()),
    distancesM: z.array(z.number()),
  }),
  /** What the machine was set to; null where nobody said. */
  targetMarginN: NullableNumber,
  marginDeadbandN: NullableNumber,
  maxDownforceN: NullableNumber,
});
export type LogOverview = z.infer<typeof LogOverview>;

export const ReadingAt = z.object({
  pass: z.number().int(),
  record: z.number().int(),
  time: Instant.nullable(),
  row: z.number().int(),
  headingDeg: NullableNumber,
  speedMps: NullableNumber,
  values: z.record(z.string(), NullableNumber),
  flags: z.array(z.string()),
  /** Why readings here are left out (null in `values`): each reason with the channels it takes. */
  leftOut: z.array(z.object({ code: z.string(), words: z.string(), channels: z.array(z.string()) })).optional(),
});
export type ReadingAt = z.infer<typeof ReadingAt>;

export const TileJson = z.object({
  tilejson: z.literal("3.0.0"),
  name: z.string(),
  tiles: z.array(z.string()),
  minzoom: z.number().int(),
  maxzoom: z.number().int(),
  bounds: z.array(z.number()),
  tileSize: z.literal(512),
  /** value = baseShiftedBy + red * redFactor + green * greenFactor + blue * blueFactor; 0,0,0 where nothing was logged. */
  encoding: z.object({
    channel: z.string(),
    unit: z.string(),
    redFactor: z.number(),
    greenFactor: z.number(),
    blueFactor: z.number(),
    offset: z.number(),
    minimum: z.number(),
    maximum: z.number(),
    step: z.number(),
  }),
  /** What the machine was set to, for classes about the target; null where nobody said. */
  targetMarginN: NullableNumber.optional(),
  marginDeadbandN: NullableNumber.optional(),
});
export type TileJson = z.infer<typeof TileJson>;
