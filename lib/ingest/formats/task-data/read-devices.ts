import type { Element } from "@xmldom/xmldom";
import { attributeOf, childrenOf, ddiOf, numberOf } from "@/lib/ingest/formats/task-data/read-xml";

/** How a device wishes its numbers to be shown: (raw + offset) * scale, in a unit of its own words. */
export interface ValuePresentation {
  offset: number;
  scale: number;
  unitWords: string;
}

/** One process data of an element, as its device describes it. */
export interface DescribedData {
  designator: string | null;
  presentation: ValuePresentation | null;
}

/** Element types of ISO 11783-10 that may be a row: a section of the machine, and a unit such as an opener. */
export const ELEMENT = { device: 1, function: 2, bin: 3, section: 4, unit: 5, connector: 6, navigation: 7 } as const;

/** One part of a machine. Offsets by the device's own reference point: forward, and right looking forward. NaN where not said. */
export interface DeviceElement {
  id: string;
  deviceId: string;
  deviceName: string;
  type: number;
  number: number;
  designator: string | null;
  parent: DeviceElement | null;
  forwardM: number;
  rightM: number;
  widthM: number;
  /** By data dictionary identifier. */
  data: Map<number, DescribedData>;
}

const OFFSET_X = 134;
const OFFSET_Y = 135;
/** Actual, then default working width: the first that has a fixed value. */
const WIDTHS = [67, 68, 70, 66] as const;

/** Every element of every device (`DVC`) under some roots, by its id. Ids are unique in task data. */
export function readDevices(roots: readonly Element[]): Map<string, DeviceElement> {
  const all = new Map<string, DeviceElement>();
  for (const root of roots) {
    for (const device of childrenOf(root, "DVC")) {
      for (const element of readDevice(device)) if (!all.has(element.id)) all.set(element.id, element);
    }
  }
  return all;
}

interface DeviceProperty {
  ddi: number;
  value: number;
}

function readDevice(device: Element): DeviceElement[] {
  const presentations = readPresentations(device);
  const data = new Map<number, DescribedData & { ddi: number }>();
  const properties = new Map<number, DeviceProperty>();
  for (const process of childrenOf(device, "DPD")) {
    const presentation = presentations.get(numberOf(process, "F")) ?? null;
    const designator = attributeOf(process, "E");
    data.set(numberOf(process, "A"), { ddi: ddiOf(process, "B"), designator, presentation });
  }
  for (const property of childrenOf(device, "DPT")) {
    properties.set(numberOf(property, "A"), { ddi: ddiOf(property, "B"), value: numberOf(property, "C") });
  }
  const parentOf = new Map<DeviceElement, number>();
  const byObject = new Map<number, DeviceElement>();
  for (const node of childrenOf(device, "DET")) {
    const element = readElement(node, device, { data, properties });
    byObject.set(numberOf(node, "B"), element);
    parentOf.set(element, numberOf(node, "F"));
  }
  const elements = [...byObject.values()];
  for (const element of elements) {
    const parent = byObject.get(parentOf.get(element) ?? NaN);
    // A loop of parents, in a damaged file, would never end.
    if (parent && !hasAncestor(parent, element)) element.parent = parent;
  }
  return elements;
}

function hasAncestor(element: DeviceElement, ancestor: DeviceElement): boolean {
  for (let at: DeviceElement | null = element; at; at = at.parent) if (at === ancestor) return true;
  return false;
}

function readPresentations(device: Element): Map<number, ValuePresentation> {
  return new Map(
    childrenOf(device, "DVP").map((node): [number, ValuePresentation] => {
      const [offset, scale] = [numberOf(node, "B"), numberOf(node, "C")];
      const unitWords = attributeOf(node, "E") ?? "";
      return [
        numberOf(node, "A"),
        { offset: Number.isNaN(offset) ? 0 : offset, scale: Number.isNaN(scale) ? 1 : scale, unitWords },
      ];
    }),
  );
}

function readElement(
  node: Element,
  device: Element,
  described: { data: Map<number, DescribedData & { ddi: number }>; properties: Map<number, DeviceProperty> },
): DeviceElement {
  const objects = childrenOf(node, "DOR").map((reference) => numberOf(reference, "A"));
  const fixed = new Map<number, number>();
  const data = new Map<number, DescribedData>();
  for (const object of objects) {
    const property = described.properties.get(object);
    if (property) fixed.set(property.ddi, property.value);
    const process = described.data.get(object);
    if (process) data.set(process.ddi, process);
  }
  const width = WIDTHS.map((ddi) => fixed.get(ddi)).find((value) => value !== undefined && value > 0);
  const deviceId = attributeOf(device, "A") ?? "";
  return {
    id: attributeOf(node, "A") ?? "",
    deviceId,
    deviceName: attributeOf(device, "B") ?? deviceId,
    type: numberOf(node, "C"),
    number: numberOf(node, "E"),
    designator: attributeOf(node, "D"),
    parent: null,
    // Millimetres in the file.
    forwardM: (fixed.get(OFFSET_X) ?? NaN) / 1000,
    rightM: (fixed.get(OFFSET_Y) ?? NaN) / 1000,
    widthM: (width ?? NaN) / 1000,
    data,
  };
}
