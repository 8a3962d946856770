import type { Role } from "@/lib/access/permissions";

/** Who asks, and inside which organisation. First argument of every query. */
export interface Scope {
  organisationId: string;
  userId: string;
  role: Role;
}
