import { z } from "zod";
import { EXPORT_FORMATS, EXPORT_LEVELS, EXPORT_SHAPES } from "@/lib/export/export-table";
import { ZonesQuery } from "@/lib/schemas/log-queries";

const zones = ZonesQuery.shape;

/** Query parameters of an export. */
export const ExportQuery = z
  .object({
    format: z.enum(EXPORT_FORMATS).default("csv").describe("Kind of file"),
    level: z.enum(EXPORT_LEVELS).default("readings").describe("What a row of the file is"),
    shape: z
      .enum(EXPORT_SHAPES)
      .default("long")
      .describe("readings as csv or arrow: one line a record and row, or (wide) one a record"),
    bundle: z.enum(["zip"]).optional().describe("csv: zipped, with README.txt and metadata.json beside the table"),
    channel: zones.channel.optional().describe("zones: the channel"),
    breaks: zones.breaks.optional().describe("zones: class edges in the channel's SI unit"),
    cleaned: zones.cleaned.describe("false: readings as they were logged, without cleaning rules and delays"),
    minLengthM: zones.minLengthM.describe("zones: least length"),
  })
  .superRefine((query, context) => {
    const refuse = (path: string, message: string) => context.addIssue({ code: "custom", path: [path], message });
    const isTable = query.format === "csv" || query.format === "arrow";
    if (query.level === "zones" && query.channel === undefined) refuse("channel", "zones need a channel");
    if (query.level === "zones" && query.breaks === undefined) refuse("breaks", "zones need class edges");
    if (query.shape === "wide" && query.level !== "readings") refuse("shape", "only readings have a wide shape");
    if (query.shape === "wide" && !isTable)
      refuse("shape", "wide is for csv and arrow: its lines have no place of a row");
    if (query.bundle && query.format !== "csv")
      refuse("bundle", "only csv is bundled: other formats carry their notes");
  });
export type ExportQuery = z.output<typeof ExportQuery>;
