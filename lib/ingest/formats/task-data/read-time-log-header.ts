import type { Element } from "@xmldom/xmldom";
import { attributeOf, childrenOf, ddiOf, numberOf, readXmlRoot } from "@/lib/ingest/formats/task-data/read-xml";
import { stopReading } from "@/lib/ingest/ingest-error";

/** What the position of a record may hold, in the order of the binary file (ISO 11783-10, PTN). */
export const POSITION_PARTS = {
  A: { name: "north", bytes: 4 },
  B: { name: "east", bytes: 4 },
  C: { name: "up", bytes: 4 },
  D: { name: "status", bytes: 1 },
  E: { name: "pdop", bytes: 2 },
  F: { name: "hdop", bytes: 2 },
  G: { name: "satellites", bytes: 1 },
  H: { name: "utcTime", bytes: 4 },
  I: { name: "utcDate", bytes: 2 },
} as const;
export type PositionPart = keyof typeof POSITION_PARTS;

/** One value of a time log (`DLV`), by its place in the header. */
export interface LoggedValue {
  ddi: number;
  elementId: string;
  /** A value given in the header stands until another comes; NaN without one. */
  startValue: number;
}

export interface TimeLogHeader {
  /** Parts of the position that each record carries, in order. */
  parts: PositionPart[];
  values: LoggedValue[];
}

/** The XML half of a time log. Stops with `task-data-damaged`. */
export function readTimeLogHeader(bytes: Uint8Array, name: string): TimeLogHeader {
  const root = readXmlRoot(bytes, name);
  // The root is the time itself, or a wrapper around it.
  const time = root.nodeName === "TIM" ? root : childrenOf(root, "TIM")[0];
  if (!time) {
    stopReading(
      "task-data-damaged",
      `"${name}" has no TIM element, which says what a time log holds. Export it again.`,
    );
  }
  const position = childrenOf(time, "PTN")[0];
  return { parts: position ? readParts(position) : [], values: childrenOf(time, "DLV").map(readValue) };
}

/** An attribute that is present and empty stands in the binary file; one with a value does not. */
function readParts(position: Element): PositionPart[] {
  const letters = Object.keys(POSITION_PARTS) as PositionPart[];
  return letters.filter((letter) => position.hasAttribute(letter) && attributeOf(position, letter) === null);
}

function readValue(value: Element): LoggedValue {
  return { ddi: ddiOf(value, "A"), elementId: attributeOf(value, "C") ?? "", startValue: numberOf(value, "B") };
}
