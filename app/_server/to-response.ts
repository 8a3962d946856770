import "server-only";
import { randomBytes } from "node:crypto";
import { ZodError } from "zod";
import { AppError, ERROR_CODES, type ErrorPlace } from "@/lib/errors";
import type { Problem } from "@/lib/schemas/problem";

function pathOf(segments: PropertyKey[]): string {
  return segments.map(String).join(".");
}

function fromZod(error: ZodError): AppError {
  const places: ErrorPlace[] = error.issues.map((issue) => ({ path: pathOf(issue.path), message: issue.message }));
  const first = places[0];
  const where = first?.path ? `${first.path}: ` : "";
  return new AppError("unprocessable", first ? `${where}${first.message}` : "The input breaks a rule.", { places });
}

function unknownError(error: unknown): AppError {
  const logId = randomBytes(6).toString("hex");
  console.error(`error ${logId}:`, error);
  return new AppError("internal", `Something went wrong on our side. If you report it, quote ${logId}.`, {
    extra: { logId },
    cause: error,
  });
}

function toAppError(error: unknown): AppError {
  if (error instanceof AppError) return error;
  if (error instanceof ZodError) return fromZod(error);
  return unknownError(error);
}

/** RFC 9457 body of any thrown thing; what we did not foresee becomes one fixed sentence with an id to find it by. */
export function toProblem(thrown: unknown): Problem {
  const error = toAppError(thrown);
  const { status, title } = ERROR_CODES[error.code];
  return {
    ...error.extra,
    type: `urn:coulterbook:problem:${error.detailCode}`,
    title,
    status,
    detail: error.userMessage,
    code: error.detailCode,
    ...(error.places.length > 0 ? { errors: error.places } : {}),
  };
}

/** The same as a response. */
export function toResponse(thrown: unknown): Response {
  const problem = toProblem(thrown);
  const headers = new Headers({ "content-type": "application/problem+json", "cache-control": "no-store" });
  if (problem.status === 401) headers.set("www-authenticate", "Bearer");
  if (typeof problem.retryAfterS === "number") headers.set("retry-after", String(problem.retryAfterS));
  return new Response(JSON.stringify(problem), { status: problem.status, headers });
}
