import { AppError } from "@/lib/errors";
import type { IngestError } from "@/lib/ingest/ingest-error";

/** An error of the reader as an answer to a request: 422 naming column and rule. */
export function mappingError(error: IngestError): AppError {
  const { code, message, column, line } = error;
  return new AppError("unprocessable", message, { detailCode: code, places: [{ message, column, line }] });
}
