import { AppError } from "@/lib/errors";

/** Which form of readings the caller takes. @throws AppError `not_acceptable` for one that is not made */
export function chooseReadingsFormat(accept: string | null): "json" | "packed" {
  const types = (accept ?? "*/*").split(",").map((part) => (part.split(";")[0] ?? "").trim().toLowerCase());
  if (types.some((type) => ["application/json", "*/*", "application/*", ""].includes(type))) return "json";
  if (types.includes("application/octet-stream")) return "packed";
  throw new AppError(
    "not_acceptable",
    "Readings come as application/json, or packed Float32 as application/octet-stream.",
  );
}

/** A pass number of an address. @throws AppError `not_found` */
export function parsePassNumber(text: string): number {
  if (/^[1-9]\d{0,8}$/.test(text)) return Number(text);
  throw new AppError("not_found", `"${text}" is not the number of a pass.`);
}
