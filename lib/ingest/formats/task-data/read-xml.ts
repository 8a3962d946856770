import { DOMParser, type Element } from "@xmldom/xmldom";
import { stopReading } from "@/lib/ingest/ingest-error";

/** The root of an XML file. Stops with `task-data-damaged`. */
export function readXmlRoot(bytes: Uint8Array, name: string): Element {
  try {
    const parser = new DOMParser({ onError: () => undefined });
    const root = parser.parseFromString(decodeXml(bytes), "text/xml").documentElement;
    if (root) return root;
  } catch {
    // Told below, with the name of the file.
  }
  stopReading(
    "task-data-damaged",
    `"${name}" is no readable XML: it was cut short or damaged. Export the task data again.`,
  );
}

/** XML is UTF-8 unless its mark or its first line says otherwise (XML 1.0, appendix F). */
function decodeXml(bytes: Uint8Array): string {
  const head = new TextDecoder("latin1").decode(bytes.subarray(0, 200));
  const named = /^[^<]*<\?xml[^>]*encoding=["']([A-Za-z0-9_.:-]+)["']/.exec(head)?.[1];
  const marked = bytes[0] === 0xff && bytes[1] === 0xfe ? "utf-16le" : bytes[0] === 0xfe ? "utf-16be" : undefined;
  return createDecoder(marked ?? named ?? "utf-8").decode(bytes);
}

function createDecoder(encoding: string): TextDecoder {
  try {
    return new TextDecoder(encoding);
  } catch {
    return new TextDecoder("utf-8");
  }
}

export function childrenOf(parent: Element, tag: string): Element[] {
  return [...parent.childNodes].filter((node): node is Element => node.nodeType === 1 && node.nodeName === tag);
}

/** An attribute that is there and not blank. */
export function attributeOf(element: Element, name: string): string | null {
  return element.getAttribute(name)?.trim() || null;
}

/** A whole or decimal number in an attribute; NaN without one. */
export function numberOf(element: Element, name: string): number {
  const text = attributeOf(element, name);
  return text !== null && /^[+-]?\d+(?:\.\d+)?(?:[eE][+-]?\d+)?$/.test(text) ? Number(text) : NaN;
}

/** A data dictionary identifier: four hexadecimal digits. NaN without one. */
export function ddiOf(element: Element, name: string): number {
  const text = attributeOf(element, name);
  return text !== null && /^[0-9A-F]{1,4}$/i.test(text) ? parseInt(text, 16) : NaN;
}
