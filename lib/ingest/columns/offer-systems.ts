import type { CellSummary } from "@/lib/ingest/columns/summarise-cells";
import type { ColumnProposal, CrsCandidate, InspectOptions } from "@/lib/ingest/log-format";
import type { NoteBook } from "@/lib/ingest/records/note-book";
import { createToDegrees } from "@/lib/ingest/records/project-position";

/** A log lies within so many kilometres of its field's corner. */
const NEAR_KM = 30;
const KM_A_DEGREE = 111.2;

/**
 * Systems that easting and northing may be in where the file does not say, best first: UTM zones about the field, and web
 * Mercator, that put the log near it. Without a field, nothing is offered: every zone fits every number.
 */
export function offerSystems(
  proposals: readonly (ColumnProposal | null)[],
  summaries: readonly CellSummary[],
  { near, notes }: { near: InspectOptions["near"]; notes: NoteBook },
): CrsCandidate[] {
  const of = (channel: string) => summaries[proposals.findIndex((proposal) => proposal?.channel === channel)]?.median;
  const [east, north] = [of("easting"), of("northing")];
  if (east == null || north == null || of("longitude") != null) return [];
  if (!near) {
    notes.add("system-unknown");
    return [];
  }
  const fitting = candidatesAbout(near.longitude, near.latitude)
    .map((candidate) => ({ ...candidate, km: distanceKm(candidate.crs, [east, north], near) }))
    .filter(({ km }) => km <= NEAR_KM)
    .sort((a, b) => a.km - b.km);
  notes.add(fitting.length > 0 ? "systems-offered" : "system-unknown");
  return fitting.map(({ crs, name, km }) => ({
    crs,
    words: `${name}, which puts the log ${km < 1 ? "less than 1" : Math.round(km)} km from the field`,
  }));
}

function candidatesAbout(longitude: number, latitude: number): { crs: string; name: string }[] {
  const zone = Math.floor((longitude + 180) / 6) + 1;
  const south = latitude < 0;
  const zones = [zone, zone - 1, zone + 1].map((number) => ((number + 59) % 60) + 1);
  const utm = zones.map((number) => ({
    crs: `EPSG:${(south ? 32_700 : 32_600) + number}`,
    name: `UTM zone ${number} ${south ? "south" : "north"}`,
  }));
  return [...utm, { crs: "EPSG:3857", name: "web Mercator" }];
}

function distanceKm(
  crs: string,
  [east, north]: [number, number],
  near: { longitude: number; latitude: number },
): number {
  const [longitude, latitude] = createToDegrees(crs)?.(east, north) ?? [NaN, NaN];
  const across = Math.abs(longitude - near.longitude) % 360;
  const eastKm = Math.min(across, 360 - across) * KM_A_DEGREE * Math.cos((near.latitude * Math.PI) / 180);
  const km = Math.hypot(eastKm, (latitude - near.latitude) * KM_A_DEGREE);
  return Number.isNaN(km) ? Infinity : km;
}
