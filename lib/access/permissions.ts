/** Roles, from most to least trusted. */
export const ROLES = ["owner", "agronomist", "researcher", "operator", "viewer"] as const;
export type Role = (typeof ROLES)[number];

/** Which roles may do what. Every route and action names one of these. */
export const PERMISSIONS = {
  "fields.read": ["owner", "agronomist", "researcher", "operator", "viewer"],
  "fields.write": ["owner", "agronomist"],
  "notes.read": ["owner", "agronomist", "researcher", "operator", "viewer"],
  "notes.write": ["owner", "agronomist", "researcher", "operator"],
  "machines.read": ["owner", "agronomist", "researcher", "operator"],
  "machines.write": ["owner", "agronomist"],
  "logs.read": ["owner", "agronomist", "researcher", "operator", "viewer"],
  "logs.upload": ["owner", "agronomist", "operator"],
  "logs.map": ["owner", "agronomist", "operator"],
  /** Cleaning rules and delays. */
  "logs.clean": ["owner", "agronomist"],
  "logs.export": ["owner", "agronomist", "researcher"],
  "logs.delete": ["owner", "agronomist"],
  /** One's own upload, while nothing was ever read from it; any log with `logs.delete`. */
  "logs.remove": ["owner", "agronomist", "operator"],
  "recipes.read": ["owner", "agronomist", "researcher", "operator"],
  "recipes.write": ["owner", "agronomist", "operator"],
  "legends.read": ["owner", "agronomist", "researcher", "operator", "viewer"],
  /** Class edges for everyone. */
  "legends.write": ["owner", "agronomist", "researcher"],
  "shares.read": ["owner", "agronomist"],
  "shares.write": ["owner", "agronomist"],
  "members.read": ["owner", "agronomist", "researcher"],
  "members.write": ["owner"],
  "tokens.own": ["owner", "agronomist", "researcher", "operator", "viewer"],
  "me.own": ["owner", "agronomist", "researcher", "operator", "viewer"],
  "audit.read": ["owner"],
} as const satisfies Record<string, readonly Role[]>;

export type Permission = keyof typeof PERMISSIONS;

/** Whether a role may do this. */
export function can(role: Role, permission: Permission): boolean {
  return (PERMISSIONS[permission] as readonly Role[]).includes(role);
}
