import { BoundaryFileFailure } from "@/lib/fields/boundary-file-error";

/** Deeper and longer than any file of places; the parser takes minutes over what has no end. */
const DEEPEST = 64;
const MOST_ELEMENTS = 120_000;

/** Whole comments, character data and instructions; then one tag; then a bracket that begins none of these. */
const MARKUP = /<!--[\s\S]*?-->|<!\[CDATA\[[\s\S]*?\]\]>|<\?[\s\S]*?\?>|<(\/?)[\p{L}_:][^<>]*>|</gu;

function refuse(code: "file-damaged" | "file-unsafe", message: string): never {
  throw new BoundaryFileFailure(code, message);
}

/**
 * One walk over the markup before a parser sees it: brackets that begin no tag, nesting and number of elements.
 * @throws BoundaryFileFailure
 */
export function checkXmlShape(text: string): void {
  let [depth, elements] = [0, 0];
  for (const match of text.matchAll(MARKUP)) {
    const [tag, slash] = match;
    if (tag === "<")
      refuse("file-damaged", `The file is not well-formed XML: character ${match.index + 1} begins no tag.`);
    if (slash === undefined) continue;
    if (slash === "/") depth--;
    else {
      elements++;
      if (!tag.endsWith("/>")) depth++;
    }
    if (depth > DEEPEST)
      refuse("file-unsafe", `The file nests elements deeper than ${DEEPEST}; no file of places does.`);
    if (elements > MOST_ELEMENTS) {
      refuse("file-unsafe", `The file has more than ${MOST_ELEMENTS} elements. Take out all but the boundary.`);
    }
  }
}
