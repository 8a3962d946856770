import { isRowable } from "@/lib/ingest/channel-quantities";
import { guessUnit } from "@/lib/ingest/columns/guess-unit";
import { nameChannel } from "@/lib/ingest/columns/name-channel";
import { readHeaderUnit, readUnitWord } from "@/lib/ingest/columns/read-unit-words";
import { setAsideSentinels } from "@/lib/ingest/columns/find-sentinels";
import type { CellSummary } from "@/lib/ingest/columns/summarise-cells";
import { readRowNumber, tokeniseHeader } from "@/lib/ingest/columns/tokenise-header";
import type { ColumnProposal } from "@/lib/ingest/log-format";
import type { LogShape } from "@/lib/ingest/mapping";
import type { ChannelId } from "@/lib/logs/channel";

export interface ColumnEvidence {
  name: string;
  /** Cell of the units line, where there is one. */
  unitCell: string | null;
  summary: CellSummary;
}

/**
 * What each column seems to mean, and the shape these meanings make. Nothing here is final: a person confirms. `known` meanings
 * come from the file itself and stand; beside them a guess from words alone is never sure.
 */
export function guessColumns(
  columns: readonly ColumnEvidence[],
  known: readonly (ColumnProposal | undefined)[] = [],
): {
  proposals: (ColumnProposal | null)[];
  shape: LogShape;
} {
  const proposals = columns.map((column, index) => known[index] ?? guessColumn(column));
  if (known.length > 0) proposals.forEach((proposal, index) => doubtGuess(known[index] ? null : proposal));
  keepBestOfEach(proposals);
  dropLoneWeek(proposals);
  if (known.length === 0) {
    settleRows(proposals);
    freeLoneRow(proposals);
  }
  return { proposals, shape: guessShape(proposals) };
}

function guessColumn(column: ColumnEvidence): ColumnProposal | null {
  const headerUnit = readHeaderUnit(column.name);
  const unitWord = (column.unitCell === null ? null : readUnitWord(column.unitCell)) ?? headerUnit?.unit ?? null;
  // "t_s" names time only without its unit, "depth in" needs the unit kept apart; "on/off" is both.
  const tokens = tokeniseHeader(withoutAsides(headerUnit?.rest ?? column.name));
  const inRow = readRowNumber(tokens);
  const named = nameChannel(inRow?.rest ?? tokens) ?? nameChannel(tokeniseHeader(column.name));
  if (!named || column.summary.filled === 0) return null;
  // "sensor row 1" is something of row 1, not a column of row numbers.
  if (named.channel === "row" && inRow?.isNamed) return null;
  const { missing, ...summary } = setAsideSentinels(column.summary);
  const { unit, format, trust, reason } = guessUnit(named.channel, unitWord, {
    summary,
    header: column.name,
  });
  const row = inRow && isRowable(named.channel) ? inRow.row : undefined;
  const rowTrust = row !== undefined && !inRow?.isNamed ? 0.97 : 1;
  return {
    channel: named.channel,
    ...(row === undefined ? {} : { row }),
    unit,
    ...(format === undefined ? {} : { format }),
    ...(missing.length === 0 ? {} : { missing }),
    confidence: round(named.weight * trust * rowTrust),
    reason: `the header says "${named.words}"; ${reason}`,
  };
}

const DOUBT = 0.6;

function doubtGuess(proposal: ColumnProposal | null): void {
  if (!proposal) return;
  proposal.confidence = Math.min(proposal.confidence, DOUBT);
  proposal.reason += "; the file names it only in the maker's own words";
}

/** "Working (0 or 1)" is no row 1: brackets count only when they name a row. */
function withoutAsides(header: string): string {
  return header.replace(/\((?![^)]*\b(?:row|unit|r)\s*\d)[^)]*\)/gi, " ");
}

function round(confidence: number): number {
  return Math.round(Math.min(1, confidence) * 100) / 100;
}

/** A date and a time of day, and a GPS week and its seconds, are two columns of one time. */
function sharedTimePart({ unit, format }: ColumnProposal): string {
  if (unit === "local") return format ?? "";
  return unit === "gps-week" ? unit : "";
}

/** A GPS week without the seconds of the week beside it is no time; beside a whole time it is not needed. */
function dropLoneWeek(proposals: (ColumnProposal | null)[]): void {
  const times = proposals.filter((proposal) => proposal?.channel === "time");
  const isPair = times.length === 2 && times.some((time) => time?.unit === "s" || time?.unit === "ms");
  proposals.forEach((proposal, index) => {
    if (proposal?.unit === "gps-week" && !isPair) proposals[index] = null;
  });
}

/** Of several columns that seem to be the same thing, the surest keeps it; a local date and a local time may share `time`. */
function keepBestOfEach(proposals: (ColumnProposal | null)[]): void {
  const best = new Map<string, number>();
  proposals.forEach((proposal, index) => {
    if (!proposal) return;
    const key = `${proposal.channel} ${proposal.row ?? ""} ${sharedTimePart(proposal)}`;
    const other = best.get(key);
    if (other === undefined) {
      best.set(key, index);
      return;
    }
    const rival = proposals[other];
    const loser = rival && rival.confidence >= proposal.confidence ? index : other;
    if (loser === other) best.set(key, index);
    // The other is left for the person to say.
    proposals[loser] = null;
  });
}

/** Rows of a channel should run 1..n. From 0: one is added, and said. With gaps, or alone: less sure. */
function settleRows(proposals: (ColumnProposal | null)[]): void {
  const channels = new Map<ChannelId, ColumnProposal[]>();
  for (const proposal of proposals) {
    if (proposal?.row === undefined) continue;
    channels.set(proposal.channel, [...(channels.get(proposal.channel) ?? []), proposal]);
  }
  for (const group of channels.values()) {
    const rows = group.map((proposal) => proposal.row ?? 0);
    const first = Math.min(...rows);
    const isRun = Math.max(...rows) - first + 1 === rows.length;
    for (const proposal of group) {
      if (proposal.channel === "working" && group.length === 1) {
        delete proposal.row;
        continue;
      }
      if (first === 0) {
        proposal.row = (proposal.row ?? 0) + 1;
        proposal.reason += "; the header counts rows from 0, here they count from 1";
      }
      if (!isRun || first > 1 || group.length === 1) {
        proposal.confidence = round(proposal.confidence * 0.6);
        proposal.reason += "; the row numbers of this channel do not run on from 1";
      }
    }
  }
}

/** A number 1 on one column alone tells no rows apart: it is the whole machine's. */
function freeLoneRow(proposals: readonly (ColumnProposal | null)[]): void {
  const rowed = proposals.filter((proposal) => proposal?.row !== undefined);
  const [lone] = rowed;
  if (!lone || rowed.length > 1 || lone.row !== 1) return;
  delete lone.row;
  lone.reason += "; no other column has a row, so it is taken for the whole machine's";
}

function guessShape(proposals: readonly (ColumnProposal | null)[]): LogShape {
  const rowed = proposals.filter((proposal) => proposal?.row !== undefined);
  if (rowed.length > 0) return "wide";
  return proposals.some((proposal) => proposal?.channel === "row") ? "long" : "single";
}
