const ON = new Set(["true", "t", "on", "yes", "y", "working", "down", "lowered", "active"]);
const OFF = new Set(["false", "f", "off", "no", "n", "idle", "up", "raised", "inactive"]);

/** 1 for on, 0 for off, NaN for neither. Any number but 0 is on. */
export function parseBoolean(text: string): number {
  const word = text.trim().toLowerCase();
  if (word === "1" || ON.has(word)) return 1;
  if (word === "0" || OFF.has(word)) return 0;
  const value = Number(word);
  if (word === "" || !Number.isFinite(value)) return NaN;
  return value === 0 ? 0 : 1;
}
