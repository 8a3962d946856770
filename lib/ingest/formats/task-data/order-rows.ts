import { ELEMENT, type DeviceElement } from "@/lib/ingest/formats/task-data/read-devices";
import type { LoggedDevice } from "@/lib/ingest/log-format";

/** Which rows each element of the machine stands for. */
export interface RowOrder {
  rows: number;
  /** Rows of an element: one for a row, several for a section above rows, none for the whole machine. */
  rowsOf(element: DeviceElement): number[];
  device: LoggedDevice | null;
  /** Rows were put in order by their number, since their offsets do not tell. */
  isByNumber: boolean;
}

const NO_ROWS: RowOrder = { rows: 0, rowsOf: () => [], device: null, isByNumber: false };

/**
 * Rows of the machine whose parts were logged, from left to right by their offset across (DDI 135; to the right positive).
 * Rows are the machine's units where any of them is logged, else its sections.
 */
export function orderRows(all: Iterable<DeviceElement>, logged: readonly DeviceElement[]): RowOrder {
  const parts = [...all];
  for (const type of [ELEMENT.unit, ELEMENT.section]) {
    const deviceId = busiestDevice(logged.filter((element) => element.type === type));
    const ofType = parts.filter((element) => element.type === type && element.deviceId === deviceId);
    if (ofType.length >= 2) return orderElements(ofType);
  }
  return NO_ROWS;
}

function busiestDevice(logged: readonly DeviceElement[]): string | null {
  const counts = new Map<string, number>();
  for (const { deviceId } of logged) counts.set(deviceId, (counts.get(deviceId) ?? 0) + 1);
  return [...counts].sort((a, b) => b[1] - a[1])[0]?.[0] ?? null;
}

function orderElements(elements: readonly DeviceElement[]): RowOrder {
  const offsets = new Set(elements.map((element) => element.rightM));
  const isByNumber = offsets.size < elements.length || offsets.has(NaN);
  const place = (element: DeviceElement) => (isByNumber ? element.number : element.rightM);
  const ordered = [...elements].sort((a, b) => place(a) - place(b));
  const rowOf = new Map(ordered.map((element, index) => [element, index + 1]));
  const rowsOf = (element: DeviceElement): number[] => {
    // A part of a row, such as its meter, speaks for that row.
    for (let at: DeviceElement | null = element; at; at = at.parent) {
      const row = rowOf.get(at);
      if (row !== undefined) return [row];
    }
    const below = ordered.filter((row) => isBelow(row, element)).map((row) => rowOf.get(row) ?? 0);
    return below.length < ordered.length ? below : [];
  };
  return { rows: ordered.length, rowsOf, device: describeDevice(ordered, isByNumber), isByNumber };
}

function isBelow(element: DeviceElement, ancestor: DeviceElement): boolean {
  for (let at = element.parent; at; at = at.parent) if (at === ancestor) return true;
  return false;
}

/** Null where the description does not say where the rows stand across. */
function describeDevice(ordered: readonly DeviceElement[], isByNumber: boolean): LoggedDevice | null {
  if (isByNumber) return null;
  const forward = ordered.map((element) => element.forwardM);
  const hasForward = !forward.some(Number.isNaN);
  const meanForward = hasForward ? forward.reduce((sum, value) => sum + value, 0) / forward.length : NaN;
  return {
    name: ordered[0]?.deviceName ?? "",
    rows: ordered.length,
    rowOffsetsM: ordered.map((element) => element.rightM),
    rowForwardM: forward.map((value) => (hasForward ? value - meanForward : 0)),
    rowWidthsM: ordered.map((element) => (Number.isNaN(element.widthM) ? null : element.widthM)),
    rowsBehindReferenceM: hasForward ? -meanForward : null,
  };
}
