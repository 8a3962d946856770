import { can, PERMISSIONS, type Permission, type Role } from "@/lib/access/permissions";

/** Whether everything `role` may do, `other` may do too. The order of roles alone does not say so. */
export function isRoleWithin(role: Role, other: Role): boolean {
  return (Object.keys(PERMISSIONS) as Permission[]).every(
    (permission) => !can(role, permission) || can(other, permission),
  );
}

/**
 * What a token may do today: its own role while that lies within its owner's, the owner's once that became the
 * smaller one, and a viewer where neither holds the other (an operator's token of a person made researcher).
 */
export function narrowerRole(tokenRole: Role, ownerRole: Role): Role {
  if (isRoleWithin(tokenRole, ownerRole)) return tokenRole;
  return isRoleWithin(ownerRole, tokenRole) ? ownerRole : "viewer";
}
