import { and, eq, inArray, sql } from "drizzle-orm";
import type { Transaction } from "@/db/client";
import { visibleLog } from "@/db/queries/visibility";
import { logs } from "@/db/schema";
import { OUTSIDE_FIELD } from "@/lib/logs/note-codes";
import type { NewestLog } from "@/lib/schemas/fields";
import type { Scope } from "@/lib/scope";

export interface NewestLogRow extends NewestLog {
  fieldId: string;
  /** Logs of the field that nobody has mapped, or that could not be read. */
  waiting: number;
}

/** A read seeding log speaks first, then any that was read, then whatever came last. */
const SPEAKS_FIRST = sql`(${logs.status} = 'ready' and ${logs.kind} = 'seeding') desc, (${logs.status} = 'ready') desc,
  ${logs.createdAt} desc, ${logs.id} desc`;

/** The gravest severity among the findings kept for a log in its present state; null where none was kept. */
const SEVERITY = sql<NewestLog["severity"]>`(
  select case when body->'findings' @? '$[*] ? (@.severity == "act")' then 'act'
              when body->'findings' @? '$[*] ? (@.severity == "look")' then 'look'
              else 'ok' end
  from log_results
  where organisation_id = ${logs.organisationId} and log_id = ${logs.id} and version = ${logs.version}
    and kind = case when ${logs.adjustmentRevision} = 0 then 'verdict'
                    else 'verdict#' || ${logs.adjustmentRevision} end)`;

/** Of each of these fields that has a visible log, the one that speaks for it: one question for a whole page of fields. */
export async function listNewestLogs(tx: Transaction, scope: Scope, fieldIds: string[]): Promise<NewestLogRow[]> {
  if (fieldIds.length === 0) return [];
  const own = and(eq(logs.organisationId, scope.organisationId), inArray(logs.fieldId, fieldIds));
  return tx
    .selectDistinctOn([logs.fieldId], {
      fieldId: logs.fieldId,
      id: logs.id,
      name: logs.name,
      kind: logs.kind,
      status: logs.status,
      isElsewhere: sql<boolean>`${logs.notes} @> ${JSON.stringify([{ code: OUTSIDE_FIELD }])}::jsonb`,
      severity: sql<
        NewestLog["severity"]
      >`case when ${logs.status} = 'ready' and ${logs.kind} = 'seeding' then ${SEVERITY} end`,
      waiting: sql<number>`(count(*) filter (where ${logs.status} in ('needs-mapping', 'failed'))
        over (partition by ${logs.fieldId}))::int`,
    })
    .from(logs)
    .where(and(own, visibleLog(scope, logs.fieldId, logs.kind)))
    .orderBy(logs.fieldId, SPEAKS_FIRST);
}
