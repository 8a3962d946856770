/** Where a column's value stands in a feature's properties: a member, or a place in a member that is a list. */
export interface PropertyPath {
  name: string;
  key: string;
  /** From 0; null where the member itself is the value. */
  place: number | null;
}

/** Lists longer than this are not rows. */
const LONGEST_LIST = 1024;

/** Paths of the members of some features, in the order first seen; the values of a list get a column each, `depth[1]` on. */
export function collectPaths(features: readonly Record<string, unknown>[]): PropertyPath[] {
  const lengths = new Map<string, number>();
  for (const properties of features) {
    for (const [key, value] of Object.entries(properties)) {
      const length = Array.isArray(value) ? Math.min(value.length, LONGEST_LIST) : -1;
      lengths.set(key, Math.max(lengths.get(key) ?? -1, length));
    }
  }
  return [...lengths].flatMap(([key, length]): PropertyPath[] =>
    length < 0
      ? [{ name: key, key, place: null }]
      : Array.from({ length }, (_, place) => ({ name: `${key}[${place + 1}]`, key, place })),
  );
}

/** The value at a path as text: what a cell of a table would hold. Blank for null, absent, and nested values. */
export function readProperty(properties: Record<string, unknown>, path: PropertyPath): string {
  const member = properties[path.key];
  const value: unknown = path.place === null ? member : Array.isArray(member) ? member[path.place] : undefined;
  if (typeof value === "number" || typeof value === "boolean") return String(value);
  return typeof value === "string" ? value : "";
}
