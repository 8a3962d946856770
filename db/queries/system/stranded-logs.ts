import { sql } from "drizzle-orm";
import { adminDb } from "@/db/client";
import { logs } from "@/db/schema";

/** Logs that wait or were being read and have not moved for a while: their worker died, or their job was never sent. */
export async function findStrandedLogs(olderThanS: number): Promise<{ organisationId: string; logId: string }[]> {
  return adminDb()
    .select({ organisationId: logs.organisationId, logId: logs.id })
    .from(logs)
    .where(
      sql`${logs.status} in ('queued', 'reading', 'building')
        and ${logs.updatedAt} < now() - make_interval(secs => ${olderThanS})`,
    )
    .limit(100);
}
