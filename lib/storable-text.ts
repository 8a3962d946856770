import { AppError } from "@/lib/errors";

// PostgreSQL keeps neither NUL nor half a surrogate pair in text and jsonb.
const UNSTORABLE = /\u0000|\p{Surrogate}/u;

/** Deeper than anything the API takes; without an end, a hostile body would exhaust the stack. */
const DEEPEST = 32;

function findUnstorable(value: unknown, path: string, depth = 0): string | null {
  if (typeof value === "string") return UNSTORABLE.test(value) ? path : null;
  if (typeof value !== "object" || value === null) return null;
  if (depth > DEEPEST) throw new AppError("unprocessable", `The body is nested deeper than ${DEEPEST} levels.`);
  for (const [key, inner] of Object.entries(value)) {
    const found = UNSTORABLE.test(key) ? path : findUnstorable(inner, path ? `${path}.${key}` : key, depth + 1);
    if (found !== null) return found;
  }
  return null;
}

/** @throws AppError `unprocessable` naming the path of a text that the database cannot keep */
export function refuseUnstorable(value: unknown): void {
  const path = findUnstorable(value, "");
  if (path === null) return;
  const message = "contains a character that cannot be stored (NUL or half of a surrogate pair)";
  throw new AppError("unprocessable", `${path || "The body"} ${message}.`, { places: [{ path, message }] });
}
