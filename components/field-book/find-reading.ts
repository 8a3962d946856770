import type { QueryClient } from "@tanstack/react-query";
import { fetchReadingAt } from "@/components/field-book/field-book-requests";
import { logVersionKey, trackQuery, type LogVersion } from "@/components/field-book/use-log-data";
import type { Cursor, FieldBookStore } from "@/lib/map-state/field-book-store";
import { locateInPass } from "@/lib/map-state/pass-cells";
import type { PassTrack } from "@/lib/map-state/pass-track";
import type { PassBody } from "@/lib/schemas/logs";

/** Where readings of a log are looked for. */
export interface Finder {
  client: QueryClient;
  log: LogVersion;
  store: FieldBookStore;
}

/** A place in degrees. */
export interface LngLatPlace {
  lng: number;
  lat: number;
}

/** Passes of the shown channel that are in memory; the chosen one first. */
function tracksAtHand({ client, log, store }: Finder): PassTrack[] {
  const { channel, pass } = store.getState();
  const queries = client.getQueriesData<PassTrack>({
    queryKey: logVersionKey(log, "track", channel),
  });
  return queries
    .flatMap(([, track]) => (track ? [track] : []))
    .sort((a, b) => Number(b.pass === pass) - Number(a.pass === pass));
}

/** The reading under a place among the passes in memory; null where none of them lies there. */
export function findAtHand(finder: Finder, { lng, lat }: LngLatPlace): Cursor | null {
  for (const track of tracksAtHand(finder)) {
    const found = locateInPass(track, lng, lat);
    if (found) return { pass: track.pass, ...found };
  }
  return null;
}

/** Whether every pass of the log is in memory: a place on none of them is bare ground, and nobody need be asked. */
function areAllAtHand(finder: Finder): boolean {
  const passes = finder.client.getQueryData<PassBody[]>(logVersionKey(finder.log, "passes"));
  return passes !== undefined && tracksAtHand(finder).length >= passes.length;
}

/** Asks the server which pass lies under a place and fetches that pass, so that the next look finds it at hand. */
export async function findFarAway(finder: Finder, place: LngLatPlace): Promise<Cursor | null> {
  if (areAllAtHand(finder)) return null;
  const { pass } = await fetchReadingAt(finder.log.logId, place.lng, place.lat);
  const track = await finder.client.ensureQueryData(trackQuery(finder.log, finder.store.getState().channel, pass));
  const found = locateInPass(track, place.lng, place.lat);
  return found ? { pass, ...found } : null;
}
