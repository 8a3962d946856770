import type { Role } from "@/lib/access/permissions";

/** What each role is for, as said when choosing one. */
export const ROLE_WORDS: Record<Role, string> = {
  owner: "runs the organisation: people, shares, deletion, audit",
  agronomist: "everything about fields, machines, logs and shares",
  researcher: "reads all logs and exports; changes nothing about them",
  operator: "takes logs in and reads their verdicts; no harvest logs",
  viewer: "reads the fields given to them; changes nothing",
};
