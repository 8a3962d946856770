import { legendOperations } from "@/lib/openapi/operations/legends";
import { z } from "zod";
import type { Method, Operation, OperationReply } from "@/lib/openapi/operation";
import { CleanedQuery } from "@/lib/schemas/cleaning";
import { CoverageAreas } from "@/lib/schemas/coverage";
import { ExportQuery } from "@/lib/schemas/export";
import { LimitZonesBody, LimitZonesQuery } from "@/lib/schemas/limit-zones";
import { ListQuery } from "@/lib/schemas/listing";
import { CleanedChannelQuery, PlaceQuery, ReadingsQuery, SwathsQuery, ZonesQuery } from "@/lib/schemas/log-queries";
import { SwathCollectionBody, ZoneCollectionBody } from "@/lib/schemas/log-shapes";
import {
  CoverageBody,
  LogOverview,
  PassList,
  ReadingAt,
  RowStatisticsBody,
  TileJson,
  VerdictBody,
} from "@/lib/schemas/logs";
import { PackablePassReadings } from "@/lib/schemas/packed-readings";

const tag = "Readings";

export const TileQuery = z.object({
  v: z
    .string()
    .optional()
    .describe("Version and revision of the log, such as 2.1 (see tiles.json): such an address may be cached for good"),
  cleaned: CleanedQuery.shape.cleaned,
  breaks: z.string().optional().describe("Rising class edges, for a coloured picture instead of values"),
  ramp: z.string().optional().describe("The colours of the classes"),
});

export const tileReplies: OperationReply[] = [
  { status: 200, description: "512 px PNG; 0,0,0 or transparent where nothing was logged", contentType: "image/png" },
  { status: 304, description: "The caller has this tile" },
];

function notBuilt(method: Method, name: string, summary: string): Operation {
  return {
    method,
    path: `/api/v1/logs/{logId}/${name}`,
    tag,
    permission: "logs.read",
    summary,
    description: "Not built yet: answers 501.",
    replies: [],
    errors: ["not_implemented"],
  };
}

/** What came of a log. While it has no version yet these answer 409. */
export const readingOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/passes",
    tag,
    permission: "logs.read",
    summary: "Passes in order",
    query: ListQuery,
    replies: [{ status: 200, description: "A page of passes", schema: PassList }],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/passes/{pass}/readings",
    tag,
    permission: "logs.read",
    summary: "Readings of one pass",
    description:
      "JSON, or packed little-endian Float32, row after row of each record, by `Accept: application/octet-stream`. `values=packed` puts the same bytes as base64 into the JSON, in place of the lists.",
    query: ReadingsQuery,
    replies: [{ status: 200, description: "Readings", schema: PackablePassReadings }],
    errors: ["conflict", "not_acceptable"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/overview",
    tag,
    permission: "logs.read",
    summary: "A channel over the whole log, thinned for a first look",
    query: CleanedChannelQuery,
    replies: [{ status: 200, description: "The overview", schema: LogOverview }],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/rows",
    tag,
    permission: "logs.read",
    summary: "Statistics of every row, weighted by distance",
    query: CleanedChannelQuery,
    replies: [{ status: 200, description: "One item a row", schema: RowStatisticsBody }],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/coverage",
    tag,
    permission: "logs.read",
    summary: "Area swept, covered, overlapped and skipped",
    replies: [{ status: 200, description: "Areas", schema: CoverageBody }],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/coverage/areas",
    tag,
    permission: "logs.read",
    summary: "Ground worked twice, with its cause and passes, and ground left out, as polygons",
    replies: [
      {
        status: 200,
        description: "At most 2000 areas, the largest first",
        schema: CoverageAreas,
        contentType: "application/geo+json",
      },
    ],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/verdict",
    tag,
    permission: "logs.read",
    summary: "What the pass amounts to, in plain words with numbers",
    query: CleanedQuery,
    replies: [{ status: 200, description: "The verdict and its findings", schema: VerdictBody }],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/zones",
    tag,
    permission: "logs.read",
    summary: "Stretches of rows in one class, or past a limit, as polygons",
    description:
      "Either `channel` and `breaks`, for zones of a channel's classes, or `kind`, for stretches under target, at the limit, over target or too shallow: these come with `totals`, and with `patches` of neighbouring rows that touch in one pass, the largest first. A stretch shorter than `minLengthM` goes to what is about it; areas and lengths are those of the row.",
    query: ZonesQuery.partial().extend(LimitZonesQuery.partial().shape),
    replies: [
      {
        status: 200,
        description: "GeoJSON; with `kind`, totals and patches as foreign members",
        schema: z.union([LimitZonesBody, ZoneCollectionBody]),
        contentType: "application/geo+json",
      },
    ],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/swaths",
    tag,
    permission: "logs.read",
    summary: "What each pass swept, as polygons",
    query: SwathsQuery,
    replies: [
      { status: 200, description: "GeoJSON", schema: SwathCollectionBody, contentType: "application/geo+json" },
    ],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/at",
    tag,
    permission: "logs.read",
    summary: "The reading under a point",
    query: PlaceQuery,
    replies: [{ status: 200, description: "The reading", schema: ReadingAt }],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/tiles/{channel}/tiles.json",
    tag,
    permission: "logs.read",
    summary: "TileJSON 3 with the numbers that turn colours into values",
    query: CleanedQuery,
    replies: [{ status: 200, description: "TileJSON", schema: TileJson }],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/tiles/{channel}/{z}/{x}/{y}.png",
    tag,
    permission: "logs.read",
    summary: "A value tile, or a picture of classes",
    query: TileQuery,
    replies: tileReplies,
    errors: ["conflict"],
  },
  notBuilt("GET", "frames", "Shares of the machine, the field, the travel and the clock"),
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/export",
    tag,
    permission: "logs.export",
    summary: "Readings, zones or swaths as a file",
    description:
      "Column names end in the SI unit; longitude and latitude are WGS 84. `csv` (RFC 4180; a text that begins like a " +
      "formula gets an apostrophe; `Link: rel=alternate` names the zip with README.txt and metadata.json, `bundle=zip`), " +
      "`geojson` (RFC 7946; notes in the foreign member `about`), `shapefile` (zip with README.txt and metadata.txt; 422 " +
      "`export_too_large` past 2 GB), `geopackage` (notes in the table `about`), `arrow` (IPC file; notes in the schema's " +
      "metadata). The notes hold source file and SHA-256, machine, the original's mapping, method, flags and a mapping that " +
      "reads the table in again. A download that breaks off is not whole: a log read again meanwhile ends it. Every export " +
      "is recorded in the audit.",
    query: ExportQuery,
    replies: [{ status: 200, description: "The file", contentType: "text/csv" }],
    errors: ["conflict", "too_many_requests"],
  },
  ...legendOperations,
];
