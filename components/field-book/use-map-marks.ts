"use client";

import type { FeatureCollection, Geometry, Polygon, Position } from "geojson";
import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect } from "react";
import { useBook, useBookState } from "@/components/field-book/field-book-context";
import { setOverlay } from "@/components/map/overlay-layers";
import { openBounds } from "@/lib/map-state/geometry-bounds";
import { stretchRing } from "@/lib/map-state/pass-cells";
import { recordAtDistance, type PassTrack } from "@/lib/map-state/pass-track";

function polygonOf(ring: Position[]): Polygon {
  return { type: "Polygon", coordinates: [ring] };
}

/** Outlines of what is chosen, the framing that somebody asked for, and the view for the address. */
export function useMapMarks(map: MapLibreMap | null, track: PassTrack | undefined): void {
  const { store } = useBook();
  const pass = useBookState((state) => state.pass);
  const row = useBookState((state) => state.row);
  const stretch = useBookState((state) => state.stretch);
  const place = useBookState((state) => state.place);
  const frame = useBookState((state) => state.frame);
  const chosen = track?.pass === pass ? track : undefined;
  useEffect(() => {
    if (map) setOverlay(map, "pass", chosen ? polygonOf(stretchRing(chosen, null)) : null);
  }, [map, chosen]);
  useEffect(() => {
    if (!map) return;
    const has = chosen !== undefined && row !== null && row <= chosen.rowOffsetM.length;
    setOverlay(map, "row", has ? polygonOf(stretchRing(chosen, row)) : null);
  }, [map, chosen, row]);
  useEffect(() => {
    if (!map) return;
    const within = chosen !== undefined && stretch?.pass === chosen.pass;
    const ring = within
      ? stretchRing(chosen, null, recordAtDistance(chosen, stretch.fromM), recordAtDistance(chosen, stretch.toM))
      : null;
    setOverlay(map, "stretch", ring ? polygonOf(ring) : null);
  }, [map, chosen, stretch]);
  useEffect(() => {
    if (map) setOverlay(map, "places", (place ?? null) as Geometry | FeatureCollection | null);
  }, [map, place]);
  useEffect(() => {
    if (map && frame) map.fitBounds(openBounds(frame.bounds, 0.15), { padding: 32, maxZoom: 20, animate: false });
  }, [map, frame]);
  useEffect(() => {
    if (!map) return;
    const keep = () => {
      // Past the antimeridian the map counts on; an address holds a longitude within 180.
      const { lng, lat } = map.getCenter().wrap();
      store.getState().setView({ longitude: lng, latitude: lat, zoom: map.getZoom() });
    };
    map.on("moveend", keep);
    return () => {
      map.off("moveend", keep);
    };
  }, [map, store]);
}
