import { z } from "zod";

/** Control characters, line breaks among them, and those that hide or turn text round: none belongs into a name. */
const HIDDEN = /[\p{Cc}\u00ad\u200b\u200e\u200f\u2028-\u202e\u2060-\u2069\ufeff]/u;

/** One line of text as people write names: trimmed, at most `max` characters, nothing invisible in it. */
export function plainText(max: number) {
  return z
    .string()
    .trim()
    .max(max)
    .refine((text) => !HIDDEN.test(text), "a name is one line of visible characters");
}
