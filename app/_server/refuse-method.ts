import "server-only";
import { toResponse } from "@/app/_server/to-response";
import { AppError } from "@/lib/errors";
import { findMethods } from "@/lib/openapi/find-operation";

/**
 * Answers a method that an address does not take: every route of the API re-exports it for those, since Next's own
 * answer has no problem body.
 */
export async function refuseMethod(request: Request): Promise<Response> {
  const allowed = findMethods(new URL(request.url).pathname);
  const detail = `${request.method} is not taken here; ${allowed.join(", ") || "no method"} is.`;
  const response = toResponse(new AppError("method_not_allowed", detail));
  response.headers.set("allow", allowed.join(", "));
  return response;
}
