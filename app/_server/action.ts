import "server-only";
import type { z } from "zod";
import { requireScope } from "@/app/_server/require-scope";
import { toProblem } from "@/app/_server/to-response";
import { can, type Permission } from "@/lib/access/permissions";
import { AppError } from "@/lib/errors";
import type { Problem } from "@/lib/schemas/problem";
import type { Scope } from "@/lib/scope";
import { forgetAccess } from "@/lib/server/access/recent-access";

export type ActionOutcome<Value> = { ok: true; value: Value } | { ok: false; problem: Problem };

/** Next throws to redirect and to say "not found"; those must pass through. */
function isFrameworkSignal(error: unknown): boolean {
  return typeof error === "object" && error !== null && "digest" in error;
}

/**
 * Wraps a server action: `export const renameField = action("fields.write", RenameInput, async (scope, input) => ...)`.
 * Called with the organisation's slug and the input; Next itself checks the origin of actions.
 */
export function action<Schema extends z.ZodType, Value>(
  permission: Permission,
  schema: Schema,
  work: (scope: Scope, input: z.output<Schema>) => Promise<Value>,
): (organisationSlug: string, input: unknown) => Promise<ActionOutcome<Value>> {
  return async (organisationSlug, input) => {
    try {
      const { scope } = await requireScope(String(organisationSlug));
      if (!can(scope.role, permission)) throw new AppError("forbidden", `Your role does not allow ${permission}.`);
      return { ok: true, value: await work(scope, schema.parse(input)) };
    } catch (error) {
      if (isFrameworkSignal(error)) throw error;
      return { ok: false, problem: toProblem(error) };
    } finally {
      forgetAccess();
    }
  };
}
