import {
  ACTUAL_WORK_STATE,
  lookUpData,
  readCondensed,
  STATES_A_VALUE,
  type DictionaryEntry,
} from "@/lib/ingest/formats/task-data/data-dictionary";
import { readUnitWord } from "@/lib/ingest/columns/read-unit-words";
import { nameColumns } from "@/lib/ingest/columns/name-columns";
import { isRowable } from "@/lib/ingest/channel-quantities";
import type { RowOrder } from "@/lib/ingest/formats/task-data/order-rows";
import {
  ELEMENT,
  type DescribedData,
  type DeviceElement,
  type ValuePresentation,
} from "@/lib/ingest/formats/task-data/read-devices";
import type { TimeLogHeader } from "@/lib/ingest/formats/task-data/read-time-log-header";
import type { ColumnProposal } from "@/lib/ingest/log-format";
import { unitFactor } from "@/lib/units/convert-unit";
import { getUnit, type UnitId } from "@/lib/units/unit-table";

/** A column made of one value of the time log: `raw[place] * factor + offset`, or one two-bit state of it. */
export interface ValueColumn {
  name: string;
  place: number;
  factor: number;
  offset: number;
  /** Right shift of a two-bit state; -1 for a plain number, -2 for a whole value that is a state. */
  shift: number;
  /** Undefined where only the header words tell: a maker's own identifier. */
  proposal: ColumnProposal | undefined;
}

export interface ColumnPlan {
  columns: ValueColumn[];
  /** Columns whose device shows them by a scale that does not fit the dictionary. */
  disagreeing: string[];
}

export const PLAIN = -1;
const WHOLE_STATE = -2;

interface PlannedValue {
  ddi: number;
  place: number;
  element: DeviceElement | null;
  rows: number[];
}

interface ColumnDraft extends Omit<ValueColumn, "name" | "proposal"> {
  title: string;
  proposal: ColumnProposal | undefined;
}

/** The columns a time log makes: each value of its header, spread over the rows it speaks for. */
export function planColumns(
  header: TimeLogHeader,
  elements: ReadonlyMap<string, DeviceElement>,
  order: RowOrder,
): ColumnPlan {
  const values = header.values.map(({ ddi, elementId }, place): PlannedValue => {
    const element = elements.get(elementId) ?? null;
    return { ddi, place, element, rows: element ? order.rowsOf(element) : [] };
  });
  const hasMachineState = values.some(({ ddi, rows }) => ddi === ACTUAL_WORK_STATE && rows.length === 0);
  const hasForce = values.some(({ ddi }) => ddi === 427);
  const disagreeing: string[] = [];
  const drafts = values.flatMap((value): ColumnDraft[] => {
    const states = planStates(value, { elements, order, hasMachineState });
    if (states) return states;
    const entry = settleEntry(lookUpData(value.ddi), value, { hasMachineState, hasForce });
    if (!entry) return planProprietary(value);
    const presentation = describedData(value)?.presentation ?? null;
    const planned = planKnown(value, entry, presentation);
    const [first] = planned;
    if (first && presentation && entry.unit !== null && !agrees(entry, presentation)) disagreeing.push(first.title);
    return planned;
  });
  settleDoubles(drafts);
  const names = nameColumns(drafts.map((draft) => draft.title));
  const columns = drafts.map(({ title, ...draft }, index) => ({ ...draft, name: names[index] ?? title }));
  return { columns, disagreeing };
}

function describedData({ element, ddi }: PlannedValue): DescribedData | null {
  for (let at = element; at; at = at.parent) {
    const data = at.data.get(ddi);
    if (data) return data;
  }
  return null;
}

/** Where a better column exists, a lesser one of the same meaning goes under a name of its own. */
function settleEntry(
  entry: DictionaryEntry | null,
  { ddi, rows }: PlannedValue,
  { hasMachineState, hasForce }: { hasMachineState: boolean; hasForce: boolean },
): DictionaryEntry | null {
  if (!entry) return null;
  if (ddi === 366 && hasForce) return { ...entry, channel: "other:downforce pressure" };
  if (ddi === ACTUAL_WORK_STATE && rows.length > 0 && hasMachineState) return { ...entry, channel: "other:work state" };
  if (rows.length > 0 && !isRowable(entry.channel)) return { ...entry, channel: `other:${entry.words}` };
  return entry;
}

function hex(ddi: number): string {
  return ddi.toString(16).toUpperCase().padStart(4, "0");
}

/** One column, or one for each of several rows a section stands above. */
function overRows(
  { rows, ddi, element }: PlannedValue,
  words: string,
  make: (row: number | undefined, title: string) => ColumnDraft,
): ColumnDraft[] {
  if (rows.length > 0) return rows.map((row) => make(row, `${words} row ${row} (${hex(ddi)})`));
  const of = element?.designator ?? element?.deviceName ?? "";
  return [make(undefined, `${words} (${hex(ddi)})${of === "" ? "" : `, ${of}`}`)];
}

function planKnown(value: PlannedValue, entry: DictionaryEntry, presentation: ValuePresentation | null): ColumnDraft[] {
  const { channel, unit, factor, words } = entry;
  const asShown = unit === null ? readPresentation(presentation) : null;
  const shared = value.rows.length > 1 ? "; its section stands above several rows, which all get its value" : "";
  const reason =
    unit === null
      ? `the dictionary writes the unit of ${hex(value.ddi)} as "0.00%", which may mean per cent or a fraction`
      : `the file names it by the identifier ${hex(value.ddi)} of ISO 11783-11${shared}`;
  return overRows(value, words, (row, title) => ({
    title,
    place: value.place,
    factor: asShown?.factor ?? factor,
    offset: asShown?.offset ?? 0,
    shift: unit === "boolean" ? WHOLE_STATE : PLAIN,
    proposal: {
      channel,
      ...(row === undefined ? {} : { row }),
      unit: asShown?.unit ?? unit,
      confidence: unit === null ? 0.4 : 0.95,
      reason,
    },
  }));
}

/** A maker's own identifier: only the words and the scale of its device description tell, so a person must confirm. */
function planProprietary(value: PlannedValue): ColumnDraft[] {
  const data = describedData(value);
  const presentation = data?.presentation ?? null;
  const unitWords = presentation?.unitWords ? ` (${presentation.unitWords})` : "";
  const words = data?.designator ?? "data";
  const scale = presentation?.scale ?? 1;
  return overRows(value, words, (_row, title) => ({
    title: `${title}${unitWords}`,
    place: value.place,
    factor: scale,
    offset: (presentation?.offset ?? 0) * scale,
    shift: PLAIN,
    proposal: undefined,
  }));
}

function readPresentation(
  presentation: ValuePresentation | null,
): { unit: UnitId; factor: number; offset: number } | null {
  const unit = presentation && readUnitWord(presentation.unitWords);
  if (!presentation || !unit || unit === "pound") return null;
  return { unit, factor: presentation.scale, offset: presentation.offset * presentation.scale };
}

/** Whether the device shows the value as the dictionary means it, within one part in a hundred. */
function agrees({ unit, factor }: DictionaryEntry, presentation: ValuePresentation): boolean {
  const shown = readPresentation(presentation);
  if (!shown || unit === null || getUnit(shown.unit).si !== getUnit(unit).si) return true;
  if ([unit, shown.unit].some((id) => Number.isNaN(getUnit(id).factor))) return true;
  const ratio = (shown.factor * unitFactor(shown.unit)) / (factor * unitFactor(unit));
  return Math.abs(ratio - 1) < 0.01 && shown.offset === 0;
}

/** Condensed states: two bits a section, lowest bits first. Null for any other value. */
function planStates(
  value: PlannedValue,
  {
    elements,
    order,
    hasMachineState,
  }: { elements: ReadonlyMap<string, DeviceElement>; order: RowOrder; hasMachineState: boolean },
): ColumnDraft[] | null {
  const condensed = readCondensed(value.ddi);
  if (!condensed) return null;
  const sections = sectionsOf(value.element, elements);
  const count = sections.length > 0 ? sections.length : Math.max(order.rows, 0) || STATES_A_VALUE;
  const words = condensed.isActual ? "section state" : "set section state";
  const isWorking = condensed.isActual && !hasMachineState;
  const drafts: ColumnDraft[] = [];
  for (let state = 0; state < STATES_A_VALUE && condensed.firstState + state < count; state++) {
    const section = condensed.firstState + state + 1;
    const rows = rowsOfSection(sections[section - 1], section, order);
    const reason = `the file names it by the identifier ${hex(value.ddi)} of ISO 11783-11, section ${section}`;
    for (const row of isWorking ? [section] : rows) {
      drafts.push({
        title: `${words} row ${row} (${hex(value.ddi)})`,
        place: value.place,
        factor: 1,
        offset: 0,
        shift: state * 2,
        proposal: { channel: isWorking ? "working" : `other:${words}`, row, unit: "boolean", confidence: 0.9, reason },
      });
    }
  }
  return drafts;
}

function rowsOfSection(section: DeviceElement | undefined, number: number, order: RowOrder): number[] {
  const rows = section ? order.rowsOf(section) : [];
  return rows.length > 0 ? rows : [number];
}

/** Sections below an element from left to right, or its units where it has no sections. */
function sectionsOf(element: DeviceElement | null, elements: ReadonlyMap<string, DeviceElement>): DeviceElement[] {
  if (!element) return [];
  const below = [...elements.values()].filter((part) => isBelow(part, element));
  const sections = below.filter((part) => part.type === ELEMENT.section);
  const parts = sections.length > 0 ? sections : below.filter((part) => part.type === ELEMENT.unit);
  const hasOffsets = parts.every((part) => !Number.isNaN(part.rightM));
  return parts.sort((a, b) => (hasOffsets ? a.rightM - b.rightM : a.number - b.number));
}

function isBelow(part: DeviceElement, ancestor: DeviceElement): boolean {
  for (let at = part.parent; at; at = at.parent) if (at === ancestor) return true;
  return false;
}

/** A mapping takes one column for each channel and row, and a channel has rows or has none: what is over gets another name. */
function settleDoubles(drafts: readonly ColumnDraft[]): void {
  const rowed = new Set(drafts.flatMap(({ proposal }) => (proposal?.row === undefined ? [] : [proposal.channel])));
  const used = new Set<string>();
  for (const draft of drafts) {
    const { proposal } = draft;
    if (!proposal) continue;
    const isLoose = proposal.row === undefined && rowed.has(proposal.channel) && proposal.channel !== "working";
    let key = `${proposal.channel} ${proposal.row ?? ""}`;
    if (isLoose || used.has(key)) {
      const words = draft.title.replace(/[/\\]/g, " ").slice(0, 80);
      draft.proposal = { ...proposal, channel: `other:${words}`, row: undefined };
      key = `other:${words} `;
      for (let copy = 2; used.has(key); copy++) {
        const other = `${words.slice(0, 74)} (${copy})`;
        draft.proposal = { ...draft.proposal, channel: `other:${other}` };
        key = `other:${other} `;
      }
    }
    used.add(key);
  }
}
