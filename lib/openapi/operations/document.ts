import { z } from "zod";
import type { Operation } from "@/lib/openapi/operation";

export const OpenApiDocument = z.looseObject({ openapi: z.literal("3.1.0") });

export const documentOperations: Operation[] = [
  {
    method: "GET",
    path: "/api/v1/openapi.json",
    tag: "About",
    permission: "public",
    summary: "This description",
    replies: [{ status: 200, description: "OpenAPI 3.1", schema: OpenApiDocument }],
  },
];
