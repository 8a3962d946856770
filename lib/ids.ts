import { customAlphabet } from "nanoid";

/** Prefix of every kind of id; one vocabulary through tables, routes and screens. */
export const ID_PREFIXES = {
  organisation: "org",
  user: "usr",
  membership: "mem",
  field: "fld",
  machine: "mac",
  note: "not",
  log: "log",
  recipe: "rec",
  share: "shr",
  token: "tok",
  audit: "aud",
} as const;
export type IdKind = keyof typeof ID_PREFIXES;

const random = customAlphabet("0123456789abcdefghjkmnpqrstvwxyz", 20);

/** A new id such as `log_3k9x…`: 100 random bits after the prefix. */
export function newId(kind: IdKind): string {
  return `${ID_PREFIXES[kind]}_${random()}`;
}

/** A pattern for one kind of id; anything else is "not found" before it reaches the database. */
export function isId(kind: IdKind, text: string): boolean {
  return new RegExp(`^${ID_PREFIXES[kind]}_[0-9a-z]{6,32}$`).test(text);
}
