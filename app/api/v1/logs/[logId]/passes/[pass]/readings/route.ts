import { parseQuery } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { ReadingsQuery } from "@/lib/schemas/log-queries";
import { PackablePassReadings } from "@/lib/schemas/packed-readings";
import { readPass, readPassPacked } from "@/lib/server/logs/read-pass";
import { chooseReadingsFormat, parsePassNumber } from "@/lib/server/logs/readings-format";

export const GET = withScope<"logId" | "pass">("logs.read", async ({ container, scope, params, request, url }) => {
  const query = parseQuery(ReadingsQuery, url);
  const input = { logId: params.logId, pass: parsePassNumber(params.pass), ...query };
  if (chooseReadingsFormat(request.headers.get("accept")) === "json") {
    return reply(PackablePassReadings, await readPass(container, scope, input), { headers: { vary: "accept" } });
  }
  const packed = await readPassPacked(container, scope, input);
  return new Response(packed.bytes, {
    headers: {
      "content-type": "application/octet-stream",
      "cache-control": "private, no-store",
      vary: "accept",
      "x-records": String(packed.records),
      "x-rows": String(packed.rows),
      "x-unit": packed.unit,
    },
  });
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
