import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { ZonesQuery } from "@/lib/schemas/log-queries";
import { ZoneCollectionBody } from "@/lib/schemas/log-shapes";
import { readZones } from "@/lib/server/logs/read-places";

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params, url }) => {
  const query = parseQuery(ZonesQuery, url);
  const zones = await readZones(container, scope, { logId: params.logId, ...query });
  return reply(ZoneCollectionBody, zones, { headers: { "content-type": "application/geo+json" } });
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
