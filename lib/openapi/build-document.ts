import { z } from "zod";
import { OPERATIONS } from "@/lib/openapi";
import { describeOperation } from "@/lib/openapi/describe-operation";
import { Problem } from "@/lib/schemas/problem";

const CONVENTIONS = [
  "SI units throughout, the unit at the end of each name (`areaM2`, `speedMps`); positions are [longitude, latitude] in",
  "WGS 84; times are ISO 8601 UTC. Rows count from 1, the leftmost looking forward. Null is a missing value, never 0.",
  "Errors are RFC 9457 problems. Lists give `items` and `nextCursor`; hand the cursor back as `cursor`.",
  "Whoever belongs to several organisations names one by slug or id in the header `X-Organisation`.",
].join(" ");

/** The whole API as OpenAPI 3.1, from the schemas that check requests and replies. */
export function buildOpenApiDocument(baseUrl: string): Record<string, unknown> & { openapi: "3.1.0" } {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const operation of OPERATIONS) {
    (paths[operation.path] ??= {})[operation.method.toLowerCase()] = describeOperation(operation);
  }
  return {
    openapi: "3.1.0",
    info: { title: "Coulterbook", version: "1", description: CONVENTIONS },
    servers: [{ url: baseUrl }],
    tags: [...new Set(OPERATIONS.map((operation) => operation.tag))].map((name) => ({ name })),
    paths,
    components: {
      schemas: { Problem: z.toJSONSchema(Problem, { io: "output" }) },
      securitySchemes: {
        session: { type: "apiKey", in: "cookie", name: "next-auth.session-token" },
        token: { type: "http", scheme: "bearer", description: "A personal token, made in settings" },
      },
    },
  };
}
