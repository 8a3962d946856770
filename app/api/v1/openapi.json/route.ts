import { reply } from "@/app/_server/reply";
import { withPublic } from "@/app/_server/with-scope";
import { buildOpenApiDocument } from "@/lib/openapi/build-document";
import { OpenApiDocument } from "@/lib/openapi/operations/document";

export const GET = withPublic(async ({ container }) =>
  reply(OpenApiDocument, buildOpenApiDocument(container.env.baseUrl), {
    headers: { "cache-control": "public, max-age=60", "access-control-allow-origin": "*" },
  }),
);

export {
  refuseMethod as POST,
  refuseMethod as PUT,
  refuseMethod as PATCH,
  refuseMethod as DELETE,
} from "@/app/_server/refuse-method";
