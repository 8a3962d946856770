import { describe, expect, it } from "vitest";
import { isRoleWithin, narrowerRole } from "@/lib/access/narrower-role";
import { can, PERMISSIONS, ROLES, type Permission } from "@/lib/access/permissions";

const permissions = Object.keys(PERMISSIONS) as Permission[];

describe("isRoleWithin", () => {
  it("goes by what roles may do, not by their order", () => {
    expect(isRoleWithin("agronomist", "owner")).toBe(true);
    expect(isRoleWithin("owner", "agronomist")).toBe(false);
    // An operator uploads; a researcher does not, and reads members.
    expect(isRoleWithin("operator", "researcher")).toBe(false);
    expect(isRoleWithin("researcher", "operator")).toBe(false);
    for (const role of ROLES) expect(isRoleWithin("viewer", role)).toBe(true);
  });
});

describe("narrowerRole", () => {
  it("allows nothing that either of the two may not, for every pair", () => {
    for (const token of ROLES) {
      for (const owner of ROLES) {
        const role = narrowerRole(token, owner);
        for (const permission of permissions.filter((one) => can(role, one))) {
          expect({ token, owner, permission, allowed: can(token, permission) && can(owner, permission) }).toEqual({
            token,
            owner,
            permission,
            allowed: true,
          });
        }
      }
    }
  });

  it("leaves a fitting token as it is", () => {
    expect(narrowerRole("researcher", "owner")).toBe("researcher");
    expect(narrowerRole("owner", "researcher")).toBe("researcher");
    expect(narrowerRole("operator", "researcher")).toBe("viewer");
  });
});
