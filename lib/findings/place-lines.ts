import type { FindingPlace } from "@/lib/findings/finding";
import { cutLineAtAntimeridian } from "@/lib/geo/cut-at-antimeridian";
import type { PlacedLog } from "@/lib/logs/placed-log";
import { rowLonLat } from "@/lib/rows/row-position";

/** A line needs no more corners than this to be found on a map. */
const MAX_CORNERS = 60;

/** The line a row drew from one record to another of the same pass; null where it is a single point. */
export function rowLine(
  placed: PlacedLog,
  row: number,
  span: { firstRecord: number; lastRecord: number; maxCorners?: number },
): [number, number][] | null {
  const records: number[] = [];
  const from = span.firstRecord === span.lastRecord ? Math.max(0, span.firstRecord - 1) : span.firstRecord;
  for (let record = from; record <= span.lastRecord; record++) {
    if (Number.isFinite(placed.originEastM[record]!)) records.push(record);
  }
  const step = Math.max(1, Math.ceil(records.length / (span.maxCorners ?? MAX_CORNERS)));
  const kept = records.filter((_, k) => k % step === 0 || k === records.length - 1);
  if (kept.length < 2) return null;
  return kept.map(
    (record) => rowLonLat(placed, record, row).map((degrees) => Number(degrees.toFixed(7))) as [number, number],
  );
}

export function stretchPlace(
  placed: PlacedLog,
  row: number,
  span: { firstRecord: number; lastRecord: number } | null,
): FindingPlace | null {
  const line = span && rowLine(placed, row, span);
  return line ? linesPlace([line]) : null;
}

/** Of many stretches so many are drawn, the longest first, each with few corners: a map shows no more. */
const MAX_STRETCHES = 50;
const MAX_STRETCH_CORNERS = 12;

/** Where a row ran on the longest of some stretches, the longest first; null without any. */
export function stretchesPlace(
  placed: PlacedLog,
  row: number,
  spans: readonly { firstRecord: number; lastRecord: number; lengthM: number }[],
): FindingPlace | null {
  const longest = [...spans].sort((a, b) => b.lengthM - a.lengthM).slice(0, MAX_STRETCHES);
  const lines = longest.flatMap((span) => {
    const line = rowLine(placed, row, { ...span, maxCorners: MAX_STRETCH_CORNERS });
    return line ? [line] : [];
  });
  return lines.length > 0 ? { type: "MultiLineString", coordinates: lines.flatMap(cutLine) } : null;
}

/** Where a row ran over the whole log: one line a pass. */
export function wholeRowPlace(placed: PlacedLog, row: number): FindingPlace | null {
  const lines = placed.passes.flatMap((pass) => {
    const line = rowLine(placed, row, { firstRecord: pass.first, lastRecord: pass.first + pass.records - 1 });
    return line ? [line] : [];
  });
  return lines.length > 0 ? { type: "MultiLineString", coordinates: lines.flatMap(cutLine) } : null;
}

function linesPlace(lines: [number, number][][]): FindingPlace {
  const [only, ...others] = lines.flatMap(cutLine);
  return others.length === 0 && only
    ? { type: "LineString", coordinates: only }
    : { type: "MultiLineString", coordinates: only ? [only, ...others] : [] };
}

/** As RFC 7946 3.1.9 wants it. */
function cutLine(line: [number, number][]): [number, number][][] {
  return cutLineAtAntimeridian(line) as [number, number][][];
}
