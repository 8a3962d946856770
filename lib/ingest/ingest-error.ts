/** Why a file could not be read. Codes are stable: screens, scripts and tests name them. */
export const INGEST_ERROR_CODES = [
  "empty-file",
  "not-a-log",
  "unknown-file-kind",
  "archive-truncated",
  "archive-damaged",
  "archive-bomb",
  "archive-unsafe-name",
  "archive-encrypted",
  "file-too-large",
  "several-layers",
  "unknown-layer",
  "task-data-damaged",
  "missing-part",
  "shapefile-damaged",
  "json-damaged",
  "not-points",
  "unclosed-quote",
  "ragged-rows",
  "line-too-long",
  "too-many-columns",
  "too-many-records",
  "too-many-readings",
  "no-readings",
  "mapping-invalid",
  "mapping-mismatch",
  "missing-position",
  "missing-row",
  "unknown-unit",
  "unit-does-not-fit",
  "bushel-weight-missing",
  "unknown-time-format",
  "unknown-time-zone",
  "unknown-projection",
  "latitude-out-of-range",
  "longitude-out-of-range",
  "records-not-together",
  "cancelled",
  "unreadable",
] as const;
export type IngestErrorCode = (typeof INGEST_ERROR_CODES)[number];

/** `message`: what happened, where, which rule, what to do next, in one or two plain sentences. */
export interface IngestError {
  code: IngestErrorCode;
  message: string;
  line?: number;
  column?: string;
}

export function ingestError(
  code: IngestErrorCode,
  message: string,
  place: { line?: number; column?: string } = {},
): IngestError {
  return { code, message, ...place };
}

/** Carries an IngestError out of deep parsing code to the one place in `index.ts` that turns it into a Result. */
export class IngestFailure extends Error {
  readonly error: IngestError;

  constructor(error: IngestError) {
    super(error.message);
    this.name = "IngestFailure";
    this.error = error;
  }
}

/** Stops reading. Caught at the top of `inspectLog` and `readLog`, which never throw. */
export function stopReading(
  code: IngestErrorCode,
  message: string,
  place: { line?: number; column?: string } = {},
): never {
  throw new IngestFailure(ingestError(code, message, place));
}
