import { kml } from "@tmcw/togeojson";
import { DOMParser } from "@xmldom/xmldom";
import { BoundaryFileFailure } from "@/lib/fields/boundary-file-error";

/** A document type can define entities that grow without end; KML never needs one. */
const DOCUMENT_TYPE = /<!\s*(DOCTYPE|ENTITY)/i;

function parseXml(text: string) {
  try {
    return new DOMParser({ onError: () => undefined }).parseFromString(text, "text/xml");
  } catch (cause) {
    const reason = cause instanceof Error ? cause.message.split("\n")[0] : "not XML";
    throw new BoundaryFileFailure("file-damaged", `The KML is not well-formed XML: ${reason}`);
  }
}

/** Features of a KML document. @throws BoundaryFileFailure damaged, or with a document type */
export function readKml(text: string): unknown {
  if (DOCUMENT_TYPE.test(text)) {
    throw new BoundaryFileFailure("file-unsafe", "The KML declares a document type or entities; those are not taken.");
  }
  const document = parseXml(text);
  if (document.documentElement?.localName !== "kml") {
    throw new BoundaryFileFailure("unknown-file-kind", "The XML is not KML: its outermost element is not <kml>.");
  }
  return kml(document);
}
