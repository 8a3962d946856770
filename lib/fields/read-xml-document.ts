import { DOMParser, type Document } from "@xmldom/xmldom";
import { BoundaryFileFailure } from "@/lib/fields/boundary-file-error";
import { checkXmlShape } from "@/lib/fields/check-xml-shape";

/** A document type can define entities that grow without end; no place file needs one. */
const DOCUMENT_TYPE = /<!\s*(DOCTYPE|ENTITY)/i;

/** @throws BoundaryFileFailure where it is not well-formed, or has a document type */
export function readXmlDocument(text: string): Document {
  if (DOCUMENT_TYPE.test(text)) {
    throw new BoundaryFileFailure("file-unsafe", "The file declares a document type or entities; those are not taken.");
  }
  checkXmlShape(text);
  try {
    return new DOMParser({ onError: () => undefined }).parseFromString(text, "text/xml");
  } catch (cause) {
    const reason = cause instanceof Error ? cause.message.split("\n")[0] : "not XML";
    throw new BoundaryFileFailure("file-damaged", `The file is not well-formed XML: ${reason}`);
  }
}
