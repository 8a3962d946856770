import "server-only";
import { dehydrate, QueryClient, type DehydratedState } from "@tanstack/react-query";
import { container } from "@/app/_server/container";
import { queryKeys } from "@/components/hooks/query-keys";
import { can } from "@/lib/access/permissions";
import { Field } from "@/lib/schemas/fields";
import { LogList } from "@/lib/schemas/logs";
import type { Scope } from "@/lib/scope";
import { readField } from "@/lib/server/fields/read-fields";
import { listLogs } from "@/lib/server/logs/read-logs";

/** As many logs as a page of the API holds; a field with more is asked for by the browser. */
const MOST_LOGS = 500;

/** A field and its logs as the browser would ask for them first thing: sent along with the page, they save it the way. */
export async function knowField(scope: Scope, fieldId: string): Promise<DehydratedState> {
  const client = new QueryClient();
  if (can(scope.role, "fields.read")) {
    client.setQueryData(queryKeys.field(fieldId), Field.parse(await readField(container(), scope, fieldId)));
  }
  if (can(scope.role, "logs.read")) {
    const logs = await listLogs(container(), scope, { fieldId, query: { limit: MOST_LOGS } });
    if (logs.nextCursor === null) client.setQueryData(queryKeys.logs(fieldId), LogList.parse(logs));
  }
  return dehydrate(client);
}
