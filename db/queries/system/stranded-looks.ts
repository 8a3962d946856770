import { sql } from "drizzle-orm";
import { adminDb } from "@/db/client";
import { logs } from "@/db/schema";

/** Logs that are ready and whose second look was never begun, or broke off: its worker died, or its job was never sent. */
export async function findStrandedLooks(olderThanS: number): Promise<{ organisationId: string; logId: string }[]> {
  return adminDb()
    .select({ organisationId: logs.organisationId, logId: logs.id })
    .from(logs)
    .where(
      sql`${logs.status} = 'ready' and ${logs.version} > 0
        and ${logs.updatedAt} < now() - make_interval(secs => ${olderThanS})
        and not exists (
          select from log_results result
          where result.organisation_id = ${logs.organisationId} and result.log_id = ${logs.id}
            and result.version = ${logs.version} and result.kind = 'look'
            and result.body->>'state' in ('done', 'failed'))`,
    )
    .limit(100);
}
