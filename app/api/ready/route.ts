import { reply } from "@/app/_server/reply";
import { withPublic } from "@/app/_server/with-scope";
import { Readiness } from "@/lib/schemas/readiness";
import { checkReadiness } from "@/lib/server/access/check-readiness";

/** Database, queue and object store answer: 200; one does not: 503 naming it. */
export const GET = withPublic(async ({ container }) => {
  const readiness = await checkReadiness(container);
  return reply(Readiness, readiness, { status: readiness.status === "ready" ? 200 : 503 });
});
