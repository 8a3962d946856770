import { LogMapping, type LogShape } from "@/lib/ingest/mapping";
import type { ChannelId } from "@/lib/logs/channel";
import type { LogColumns } from "@/lib/schemas/logs";
import { isUnitId, type UnitId } from "@/lib/units/unit-table";

export type FoundColumn = LogColumns["columns"][number];

/** What a person has made of one column so far. */
export interface ColumnChoice {
  /** `undecided`: nobody and nothing said what it means; `out`: not read. */
  use: "undecided" | "out" | "channel";
  channel: ChannelId | null;
  row: number | null;
  unit: UnitId | null;
  /** Pattern of a local time, weight of a bushel, way of writing degrees, or `from 0` for rows. */
  format: string;
  /** Numbers that stand for "nothing here", as typed: "-999, 65535". */
  missing: string;
  /** A person has looked at it: changed it, or said it is right. */
  seen: boolean;
}

/** Under this a proposal must be looked at by a person before the log is read (from 0.7 on header and values agree). */
export const LOOK_BELOW = 0.7;
const SURE_FROM = 0.9;

export type ConfidenceWord = "sure" | "likely" | "please check";

export function confidenceWord(confidence: number): ConfidenceWord {
  if (confidence >= SURE_FROM) return "sure";
  return confidence >= LOOK_BELOW ? "likely" : "please check";
}

export const UNDECIDED: ColumnChoice = {
  use: "undecided",
  channel: null,
  row: null,
  unit: null,
  format: "",
  missing: "",
  seen: false,
};

/** "-999, 65535" as numbers; null where something in it is none. */
export function readMissing(text: string): number[] | null {
  const parts = text.split(/[\s,;]+/).filter((part) => part !== "");
  const numbers = parts.map(Number);
  return numbers.every(Number.isFinite) && numbers.length <= 16 ? numbers : null;
}

function fromProposal(column: FoundColumn): ColumnChoice {
  const { proposal, hint } = column;
  if (!proposal) {
    const unit = hint?.unit !== undefined && isUnitId(hint.unit) ? hint.unit : null;
    return { ...UNDECIDED, unit, row: hint?.row ?? null };
  }
  return {
    use: "channel",
    // The reply's schema says string; ids come from the same table.
    channel: proposal.channel as ChannelId,
    row: proposal.row ?? null,
    unit: proposal.unit !== null && isUnitId(proposal.unit) ? proposal.unit : null,
    format: proposal.format ?? "",
    missing: proposal.missing?.join(", ") ?? "",
    seen: proposal.unit !== null && proposal.confidence >= LOOK_BELOW,
  };
}

/** A mapping already in force wins over fresh proposals: it was confirmed by a person or a recipe. */
function fromMapping(column: FoundColumn, mapping: LogMapping): ColumnChoice {
  const mapped = mapping.columns.find((candidate) => candidate.name === column.name);
  if (!mapped) return { ...UNDECIDED, use: "out", seen: true };
  const { channel, row, unit, format, missing } = mapped;
  return {
    use: "channel",
    channel,
    row: row ?? null,
    unit,
    format: format ?? "",
    missing: missing?.join(", ") ?? "",
    seen: true,
  };
}

export type Choices = Record<string, ColumnChoice>;

/** What the screen opens with. */
export function startChoices(found: LogColumns): Choices {
  const inForce = LogMapping.safeParse(found.mapping);
  return Object.fromEntries(
    found.columns.map((column) => [
      column.name,
      inForce.success ? fromMapping(column, inForce.data) : fromProposal(column),
    ]),
  );
}

/** The choices and the layout the screen opens with: those of the mapping in force, else what the file looks like. */
export function startLayout(found: LogColumns): { shape: LogShape; choices: Choices } {
  const inForce = LogMapping.safeParse(found.mapping);
  return { shape: inForce.success ? inForce.data.shape : found.shape, choices: startChoices(found) };
}
