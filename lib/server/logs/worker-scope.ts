import type { Scope } from "@/lib/scope";

/** The worker acts inside one organisation, for no person. */
export function workerScope(organisationId: string): Scope {
  return { organisationId, userId: "", role: "owner" };
}
