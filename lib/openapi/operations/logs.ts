import { z } from "zod";
import type { Operation, OperationReply } from "@/lib/openapi/operation";
import { ListQuery } from "@/lib/schemas/listing";
import { Log, LogAccepted, LogColumns, LogList, LogPatch, MappingMachine } from "@/lib/schemas/logs";

const tag = "Logs";
const accepted: OperationReply = { status: 202, description: "The log; work goes on", schema: Log };

/** Taking a log in, and what is said about it while and after. */
export const logOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/fields/{fieldId}/logs",
    tag,
    permission: "logs.read",
    summary: "Logs of a field, newest first",
    description: "An operator sees harvest logs only of fields given to them.",
    query: ListQuery,
    replies: [{ status: 200, description: "A page of logs", schema: LogList }],
  },
  {
    method: "POST",
    path: "/api/v1/fields/{fieldId}/logs",
    tag,
    permission: "logs.upload",
    summary: "Upload a log",
    description:
      "The same bytes in the same field: 409 naming the first log, unless `again=1`. With `together=1` several `file` parts (at most 500) are parts of one log: they need the same columns, stand in the order of their times, and each is kept; the same bytes twice are used once. A zip of CSV or GeoJSON files is one log as well.",
    query: z.object({ again: z.enum(["0", "1"]).optional(), together: z.enum(["0", "1"]).optional() }),
    form: {
      file: {
        kind: "file",
        required: true,
        description:
          "CSV or GeoJSON, also gzipped or several in a zip; zipped shapefile; zipped ISO 11783-10 task data. Repeated with `together=1`",
      },
      machineId: { kind: "text", description: "The machine that made the log" },
      mapping: { kind: "json", description: "What the columns mean; see PUT /mapping" },
    },
    replies: [{ status: 202, description: "Taken; its address in Location", schema: LogAccepted }],
    errors: ["conflict", "too_large", "unsupported_file"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}",
    tag,
    permission: "logs.read",
    summary: "One log: state, progress, counts, channels",
    replies: [{ status: 200, description: "The log", schema: Log }],
  },
  {
    method: "PATCH",
    path: "/api/v1/logs/{logId}",
    tag,
    permission: "logs.map",
    summary: "Rename a log, give it another machine, or move it to another field",
    description: "Another machine or another field has the log placed again.",
    body: LogPatch,
    replies: [{ status: 200, description: "The log as it is now", schema: Log }],
    errors: ["conflict"],
  },
  {
    method: "DELETE",
    path: "/api/v1/logs/{logId}",
    tag,
    permission: "logs.remove",
    summary: "Delete a log with everything derived from it",
    description: "An operator may delete their own uploads that were never read; owners and agronomists any log.",
    replies: [{ status: 204, description: "Gone" }],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/events",
    tag,
    permission: "logs.read",
    summary: "The log as it changes",
    description: "Server-sent events, each the same object as GET gives, until the work ends.",
    replies: [{ status: 200, description: "Events", contentType: "text/event-stream" }],
  },
  {
    method: "POST",
    path: "/api/v1/logs/{logId}/cancel",
    tag,
    permission: "logs.map",
    summary: "Stop reading a log",
    replies: [accepted],
    errors: ["conflict"],
  },
  {
    method: "POST",
    path: "/api/v1/logs/{logId}/retry",
    tag,
    permission: "logs.map",
    summary: "Read a log again",
    replies: [accepted],
    errors: ["conflict"],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/original",
    tag,
    permission: "logs.read",
    summary: "The file as it was uploaded",
    description: "Of a log in several files the one with this `sha256`, or without it all of them in a zip.",
    query: z.object({ sha256: z.string().optional() }),
    replies: [{ status: 200, description: "The same bytes", contentType: "application/octet-stream" }],
  },
  {
    method: "GET",
    path: "/api/v1/logs/{logId}/columns",
    tag,
    permission: "logs.read",
    summary: "What was found in the file and what it may mean",
    replies: [{ status: 200, description: "Columns with proposals in words", schema: LogColumns }],
    errors: ["conflict"],
  },
  {
    method: "PUT",
    path: "/api/v1/logs/{logId}/mapping",
    tag,
    permission: "logs.map",
    summary: "Say what the columns mean",
    description:
      "Reads the log again; `save` keeps the meaning as a recipe for files with the same header. `machineId` gives the log another machine in the same step. A log that waits for its turn is read with the new meaning; one being read is refused.",
    body: z.looseObject({
      columns: z.array(z.looseObject({ name: z.string(), channel: z.string(), unit: z.string().nullable() })),
      shape: z.enum(["wide", "long", "single"]),
      machineId: MappingMachine,
    }),
    replies: [accepted],
    errors: ["conflict"],
  },
];
