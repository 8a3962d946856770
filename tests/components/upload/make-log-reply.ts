import type { Log } from "@/lib/schemas/logs";

/** A log as the API gives it. */
export function makeLogReply(change: Partial<Log> = {}): Log {
  return {
    id: "log_larkspur0001",
    fieldId: "fld_eastquarter1",
    name: "east-quarter-seeding",
    kind: "seeding",
    status: "ready",
    progress: 1,
    stage: "Ready",
    error: null,
    notes: [],
    counts: { records: 12_000, rows: 24, readings: 288_000, flagged: 3, rejected: 1, passes: 12 },
    channels: [],
    startedAt: "2031-09-24T14:10:00.000Z",
    endedAt: "2031-09-24T18:10:00.000Z",
    bbox: null,
    machineId: null,
    mappingId: null,
    fileName: "east-quarter-seeding.csv",
    fileBytes: 3_300_000,
    sha256: "0".repeat(64),
    version: 1,
    createdAt: "2031-09-24T19:00:00.000Z",
    ...change,
  };
}
