import type { Operation } from "@/lib/openapi/operation";

export const logOperations: Operation[] = [];
