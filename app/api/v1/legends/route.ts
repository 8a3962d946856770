import { parseBody } from "@/app/_server/parse-body";
import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { LegendInput, LegendList } from "@/lib/schemas/legends";
import { changeLegend, readLegends } from "@/lib/server/legends/legends";

export const GET = withScope("legends.read", async ({ container, scope }) =>
  reply(LegendList, await readLegends(container, scope)),
);

export const PUT = withScope("legends.write", async ({ container, scope, request }) =>
  reply(LegendList, await changeLegend(container, scope, await parseBody(LegendInput, request))),
);

export { refuseMethod as POST, refuseMethod as PATCH, refuseMethod as DELETE } from "@/app/_server/refuse-method";
