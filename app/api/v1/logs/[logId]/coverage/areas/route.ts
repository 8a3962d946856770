import { reply } from "@/app/_server/reply";
import { withScope } from "@/app/_server/with-scope";
import { CoverageAreas } from "@/lib/schemas/coverage";
import { readCoverageAreas } from "@/lib/server/logs/read-coverage-areas";

export const GET = withScope<"logId">("logs.read", async ({ scope, params }) => {
  const areas = await readCoverageAreas(scope, params.logId);
  return reply(CoverageAreas, areas, { headers: { "content-type": "application/geo+json" } });
});

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
