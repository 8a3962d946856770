import { z } from "zod";
import { AppError } from "@/lib/errors";

const Parts = z.tuple([z.string().max(400), z.string().max(64)]);

/** The place after the last item of a page: its sort value and its id. */
export type CursorParts = z.infer<typeof Parts>;

/** A cursor that callers hand back as they got it. */
export function encodeCursor(parts: CursorParts): string {
  const bytes = new TextEncoder().encode(JSON.stringify(parts));
  return btoa(String.fromCharCode(...bytes))
    .replaceAll("+", "-")
    .replaceAll("/", "_")
    .replaceAll("=", "");
}

function parseText(cursor: string): unknown {
  try {
    const binary = atob(cursor.replaceAll("-", "+").replaceAll("_", "/"));
    return JSON.parse(new TextDecoder().decode(Uint8Array.from(binary, (character) => character.charCodeAt(0))));
  } catch {
    return null;
  }
}

/** @throws AppError `unprocessable` for anything that `encodeCursor` did not write */
export function decodeCursor(cursor: string | undefined): CursorParts | null {
  if (cursor === undefined) return null;
  const parts = Parts.safeParse(parseText(cursor));
  if (parts.success && !parts.data.some((part) => part.includes("\0"))) return parts.data;
  throw new AppError("unprocessable", "The cursor is not one that a list gave out.", {
    places: [{ path: "cursor", message: "not a cursor" }],
  });
}

/** Cuts a page from `limit + 1` rows and names the next one. */
export function pageOf<Row>(
  rows: Row[],
  limit: number,
  partsOf: (row: Row) => CursorParts,
): { rows: Row[]; nextCursor: string | null } {
  const page = rows.slice(0, limit);
  const last = page.at(-1);
  return { rows: page, nextCursor: rows.length > limit && last ? encodeCursor(partsOf(last)) : null };
}

/** @throws AppError `unprocessable` when the sort value of the cursor is not a time */
export function cursorInstant(parts: CursorParts): Date {
  const at = new Date(parts[0]);
  if (Number.isNaN(at.getTime())) throw new AppError("unprocessable", "The cursor is not one that a list gave out.");
  return at;
}
