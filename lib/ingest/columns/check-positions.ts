import type { CellSummary } from "@/lib/ingest/columns/summarise-cells";
import type { ColumnProposal, InspectOptions } from "@/lib/ingest/log-format";
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
  const longitude = summaries[x];
  const latitude = summaries[y];
  if (!longitude || !latitude || longitude.median === null || latitude.median === null) return;
  if (beyond(latitude, 90) && !beyond(longitude, 90)) {
    swap(proposals, [x, y], "latitude cannot be beyond 90 degrees, so the two columns look swapped");
    notes.add("swapped-positions");
    return;
  }
  if (!near) return;
  const apart = distanceDeg(longitude.median, latitude.median, near);
  if (apart <= OTHER_PLACE_DEG) return;
  if (distanceDeg(latitude.median, longitude.median, near) <= SAME_PLACE_DEG) {
    swap(proposals, [x, y], "the positions lie in the field only when the two columns are swapped");
    notes.add("swapped-positions");
    return;
  }
  notes.add("far-from-field");
  for (const proposal of [proposals[x], proposals[y]]) {
    if (!proposal) continue;
    proposal.confidence = Math.min(proposal.confidence, 0.5);
    proposal.reason += "; the positions lie far from the field";
  }
}

function beyond({ min, max }: CellSummary, limit: number): boolean {
  return (min !== null && min < -limit) || (max !== null && max > limit);
}

function distanceDeg(longitude: number, latitude: number, near: { longitude: number; latitude: number }): number {
  const east = Math.abs(longitude - near.longitude) % 360;
  return Math.max(Math.min(east, 360 - east), Math.abs(latitude - near.latitude));
}

function swap(proposals: (ColumnProposal | null)[], [x, y]: [number, number], reason: string): void {
  const [longitude, latitude] = [proposals[x], proposals[y]];
  if (!longitude || !latitude) return;
  proposals[x] = { ...latitude, unit: "deg", confidence: 0.4, reason };
  proposals[y] = { ...longitude, unit: "deg", confidence: 0.4, reason };
}
