import type { Map as MapLibreMap } from "maplibre-gl";

/** Moves each of two maps along with the other. Answers how to part them. */
export function lockMaps(first: MapLibreMap, second: MapLibreMap): () => void {
  let isFollowing = false;
  const lead = (from: MapLibreMap, to: MapLibreMap) => () => {
    // The one that follows moves too, and must not lead in turn.
    if (isFollowing) return;
    isFollowing = true;
    to.jumpTo({ center: from.getCenter(), zoom: from.getZoom() });
    isFollowing = false;
  };
  const leadSecond = lead(first, second);
  const leadFirst = lead(second, first);
  first.on("move", leadSecond);
  second.on("move", leadFirst);
  return () => {
    first.off("move", leadSecond);
    second.off("move", leadFirst);
  };
}
