import { z } from "zod";
import { CleanedChannelQuery } from "@/lib/schemas/log-queries";

const Known = z.number().nullable();
const Interval = z.tuple([z.number(), z.number()]).nullable();

/** Query of `GET /logs/{logId}/compare`: the log of the address is the one before, `with` the one after. */
export const CompareQuery = CleanedChannelQuery.extend({
  with: z.string().min(1).max(60).describe("The log to compare with: the one after the change"),
});

/** What an interval says of a difference (after less before): `cannot-tell` where it holds 0, or where there is none. */
export const Told = z.enum(["more", "less", "cannot-tell"]);
export type Told = z.infer<typeof Told>;

/** Runs of consecutive passes that count as independent: what an interval draws anew. */
export const ComparedBlocks = z.object({
  blocks: z.number().int(),
  passesPerBlock: z.number().int(),
  /** Correlation of a pass with the next one. */
  correlation: Known,
});
export type ComparedBlocks = z.infer<typeof ComparedBlocks>;

export const ComparedLog = z.object({
  logId: z.string(),
  name: z.string(),
  fieldId: z.string(),
  startedAt: z.string().nullable(),
  /** Passes compared: those inside the field, or all where every pass is on the headland. */
  passes: z.number().int(),
  headlandPassesLeftOut: z.number().int(),
  /** For all rows together: by how alike the means of neighbouring passes are. */
  whole: ComparedBlocks,
  /** For rows against each other: by how alike their deviations from the middle row are. */
  rows: ComparedBlocks,
  /** Distance with readings, the mean over rows. */
  distanceM: z.number(),
  targetMarginN: Known,
});
export type ComparedLog = z.infer<typeof ComparedLog>;

export const ComparedMeasure = z.object({
  measure: z.enum(["mean", "spread", "share-under-target", "share-at-limit", "share-contact-lost"]),
  /** SI unit of the numbers; `fraction` of the distance for shares. */
  unit: z.string(),
  before: Known,
  after: Known,
  difference: Known,
  interval: Interval,
  told: Told,
});
export type ComparedMeasure = z.infer<typeof ComparedMeasure>;

const RowSide = z.object({
  mean: Known,
  p05: Known,
  p25: Known,
  p50: Known,
  p75: Known,
  p95: Known,
  shareUnderTarget: Known,
  shareAtLimit: Known,
});
export type ComparedRowSide = z.infer<typeof RowSide>;

export const ComparedRow = z.object({
  row: z.number().int(),
  before: RowSide,
  after: RowSide,
  /** Mean after less mean before, with its own 95 % interval. */
  difference: Known,
  interval: Interval,
  /** The same less the middle row's difference: what the row did that the others did not. */
  beyondOthers: Known,
  /** 95 % for all rows together: in 95 of 100 comparisons without any change of a row, no row's interval leaves 0 out. */
  beyondInterval: Interval,
  /** Of `beyondInterval`; `too-small` where it leaves 0 out, but the row is within 5 % of the middle row's median. */
  told: z.enum([...Told.options, "too-small"]),
});
export type ComparedRow = z.infer<typeof ComparedRow>;

/** Body of `GET /logs/{logId}/compare`. Every figure is weighted by distance. */
export const ComparisonBody = z.object({
  channel: z.string(),
  unit: z.string(),
  before: ComparedLog,
  after: ComparedLog,
  overall: z.array(ComparedMeasure),
  /** Empty where rows cannot be paired. */
  rows: z.array(ComparedRow),
  /** Shares of the distance by value, the same classes for both; the outer classes take what lies beyond. */
  distribution: z.object({ edges: z.array(z.number()), before: z.array(z.number()), after: z.array(z.number()) }),
  /** Why there are no intervals, no rows, or no word about rows. */
  reasons: z.array(z.string()),
  /** What else may have made the difference. */
  cautions: z.array(z.string()),
});
export type ComparisonBody = z.infer<typeof ComparisonBody>;
