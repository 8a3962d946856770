import "server-only";
import { createHash } from "node:crypto";
import { withOrganisation } from "@/db/client";
import { getLogOrThrow } from "@/db/queries/logs";
import { coverageAreas } from "@/lib/coverage/coverage-areas";
import type { CoverageAreas } from "@/lib/schemas/coverage";
import type { Scope } from "@/lib/scope";
import { getFieldOrThrow } from "@/lib/server/fields/get-field-or-throw";
import { loadPlacedLog } from "@/lib/server/logs/load-placed-log";
import { cachedForLog } from "@/lib/server/logs/log-cache";

/** Ground worked twice and ground left out, as polygons; worked out once for each version and boundary. Cleaning rules change no ground. */
export async function readCoverageAreas(scope: Scope, logId: string): Promise<CoverageAreas> {
  const { log, boundary } = await withOrganisation(scope, async (tx) => {
    const row = await getLogOrThrow(tx, scope, logId);
    const field = await getFieldOrThrow(tx, scope, row.fieldId);
    return { log: row, boundary: field.boundary };
  });
  const ground = createHash("sha256")
    .update(JSON.stringify(boundary ?? null))
    .digest("base64url");
  return cachedForLog(`${log.id}:${log.version}:coverage-areas:${ground}`, async () => {
    const value = coverageAreas(await loadPlacedLog(log, "all"), boundary ?? null);
    return { value, bytes: 2 * JSON.stringify(value).length };
  });
}
