import "server-only";
import { readBody } from "@/app/_server/read-body";
import { AppError, type ErrorCode } from "@/lib/errors";
import type { BoundaryFileCode } from "@/lib/fields/boundary-file-error";
import { readBoundaryFile } from "@/lib/fields/read-boundary-file";
import { Boundary } from "@/lib/schemas/geometry";

const CODES: Record<BoundaryFileCode, ErrorCode> = {
  "empty-file": "unprocessable",
  "unknown-file-kind": "unsupported_file",
  "file-damaged": "unprocessable",
  "file-unsafe": "unprocessable",
  "no-polygon": "unprocessable",
};

async function fileOfForm(request: Request): Promise<Uint8Array> {
  const body = await readBody(request);
  const headers = { "content-type": request.headers.get("content-type") ?? "" };
  const form = await new Response(body, { headers }).formData().catch((cause: unknown) => {
    throw new AppError("bad_request", "The multipart body could not be read.", { cause });
  });
  const file = form.get("file");
  if (file instanceof File) return new Uint8Array(await file.arrayBuffer());
  throw new AppError("unprocessable", "Send the boundary as the part named file.", {
    places: [{ path: "file", message: "is missing" }],
  });
}

/**
 * The boundary of a request: a JSON geometry or feature, or a file in a multipart body (GeoJSON, KML, GPX, zipped
 * shapefile); with what was done to it on the way, in plain sentences.
 */
export async function readBoundaryRequest(request: Request): Promise<{ boundary: Boundary; notes: string[] }> {
  const isForm = /^multipart\/form-data/i.test(request.headers.get("content-type") ?? "");
  const bytes = isForm ? await fileOfForm(request) : await readBody(request);
  const read = readBoundaryFile(bytes);
  if (!read.ok) {
    const isMalformedBody = !isForm && read.error.code === "file-damaged";
    const code = isMalformedBody ? "bad_request" : CODES[read.error.code];
    throw new AppError(code, read.error.message, { detailCode: read.error.code });
  }
  return { boundary: Boundary.parse(read.value.boundary), notes: read.value.notes };
}
