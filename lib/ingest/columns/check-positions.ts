import type { CellSummary } from "@/lib/ingest/columns/summarise-cells";
import type { ColumnProposal, InspectOptions } from "@/lib/ingest/log-format";
import { parseDegrees, readDegreesForm } from "@/lib/ingest/records/parse-degrees";
import type { NoteBook } from "@/lib/ingest/records/note-book";

/** Degrees within which a log and its field count as the same place, and beyond which as another. */
const SAME_PLACE_DEG = 1;
const OTHER_PLACE_DEG = 3;

/** Notices longitude and latitude that were swapped, and positions far from the field; lowers what was proposed accordingly. */
export function checkPositions(
  proposals: (ColumnProposal | null)[],
  summaries: readonly CellSummary[],
  { near, notes }: { near: InspectOptions["near"]; notes: NoteBook },
): void {
  const x = proposals.findIndex((proposal) => proposal?.channel === "longitude");
  const y = proposals.findIndex((proposal) => proposal?.channel === "latitude");
  const hasPlane = ["easting", "northing"].every((id) => proposals.some((proposal) => proposal?.channel === id));
  if (x < 0 || y < 0) {
    if (!hasPlane) notes.add("missing-position");
    return;
  }
  const written = [x, y].map((field) => proposals[field]?.format !== undefined);
  if (written.some(Boolean)) notes.add("degrees-minutes");
  const longitude = degreesOf(summaries[x], proposals[x]?.format);
  const latitude = degreesOf(summaries[y], proposals[y]?.format);
  if (!longitude || !latitude) return;
  if (beyond(latitude, 90) && !beyond(longitude, 90)) {
    swap(proposals, [x, y], "latitude cannot be beyond 90 degrees, so the two columns look swapped");
    notes.add("swapped-positions");
    return;
  }
  if (!near) return;
  const place = { longitude: longitude.median, latitude: latitude.median };
  if (distanceDeg(place, near) <= OTHER_PLACE_DEG) return;
  if (distanceDeg({ longitude: place.latitude, latitude: place.longitude }, near) <= SAME_PLACE_DEG) {
    swap(proposals, [x, y], "the positions lie in the field only when the two columns are swapped");
    notes.add("swapped-positions");
    return;
  }
  if (addSigns(proposals, [x, y], { place, near })) {
    notes.add("signs-left-out");
    return;
  }
  notes.add("far-from-field");
  for (const proposal of [proposals[x], proposals[y]]) {
    if (!proposal) continue;
    proposal.confidence = Math.min(proposal.confidence, 0.5);
    proposal.reason += "; the positions lie far from the field";
  }
}

interface Degrees {
  min: number;
  max: number;
  median: number;
}

/** What a column spans in degrees; null where its cells tell nothing. */
function degreesOf(summary: CellSummary | undefined, format: string | undefined): Degrees | null {
  if (!summary) return null;
  const form = format === undefined ? null : readDegreesForm(format);
  if (form) {
    const values = summary.sample.map((text) => parseDegrees(text, form)).filter((value) => !Number.isNaN(value));
    const middle = values[Math.floor(values.length / 2)];
    return middle === undefined ? null : { min: Math.min(...values), max: Math.max(...values), median: middle };
  }
  const { min, max, median } = summary;
  return min === null || max === null || median === null ? null : { min, max, median };
}

/** Positions of the western or southern half written without their sign: they lie in the field only with it. */
function addSigns(
  proposals: (ColumnProposal | null)[],
  [x, y]: [number, number],
  { place, near }: { place: Place; near: Place },
): boolean {
  for (const [west, south] of [
    [true, false],
    [false, true],
    [true, true],
  ] as const) {
    const signed = {
      longitude: west ? -Math.abs(place.longitude) : place.longitude,
      latitude: south ? -Math.abs(place.latitude) : place.latitude,
    };
    if (distanceDeg(signed, near) > SAME_PLACE_DEG) continue;
    if (west) leftOut(proposals[x], "W");
    if (south) leftOut(proposals[y], "S");
    return true;
  }
  return false;
}

function leftOut(proposal: ColumnProposal | null | undefined, letter: "W" | "S"): void {
  if (!proposal) return;
  proposal.format = `${proposal.format ?? "dd.dddd"} ${letter}`;
  proposal.confidence = Math.min(proposal.confidence, 0.5);
  proposal.reason += `; the positions lie in the field only when they are ${letter === "W" ? "west" : "south"}`;
}

function beyond({ min, max }: Degrees, limit: number): boolean {
  return min < -limit || max > limit;
}

interface Place {
  longitude: number;
  latitude: number;
}

function distanceDeg(place: Place, near: Place): number {
  const east = Math.abs(place.longitude - near.longitude) % 360;
  return Math.max(Math.min(east, 360 - east), Math.abs(place.latitude - near.latitude));
}

function swap(proposals: (ColumnProposal | null)[], [x, y]: [number, number], reason: string): void {
  const [longitude, latitude] = [proposals[x], proposals[y]];
  if (!longitude || !latitude) return;
  proposals[x] = { ...latitude, unit: "deg", confidence: 0.4, reason };
  proposals[y] = { ...longitude, unit: "deg", confidence: 0.4, reason };
}
