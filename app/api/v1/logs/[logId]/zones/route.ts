import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { LimitZonesBody, LimitZonesQuery } from "@/lib/schemas/limit-zones";
import { ZonesQuery } from "@/lib/schemas/log-queries";
import { ZoneCollectionBody } from "@/lib/schemas/log-shapes";
import { readLimitZones, readZones } from "@/lib/server/logs/read-places";

const headers = { "content-type": "application/geo+json" };

export const GET = withScope<"logId">("logs.read", async ({ container, scope, params, url }) => {
  if (url.searchParams.has("kind")) {
    const query = parseQuery(LimitZonesQuery, url);
    const named = { ...headers, "content-disposition": `inline; filename="zones-${query.kind}.geojson"` };
    const zones = await readLimitZones(container, scope, { logId: params.logId, ...query });
    return reply(LimitZonesBody, zones, { headers: named });
  }
  const query = parseQuery(ZonesQuery, url);
  return reply(ZoneCollectionBody, await readZones(container, scope, { logId: params.logId, ...query }), { headers });
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
