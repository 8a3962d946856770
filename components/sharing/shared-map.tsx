"use client";

import { useMemo } from "react";
import type { MultiPolygon, Polygon, Position } from "geojson";
import { BoundarySketch } from "@/components/fields/boundary-sketch";
import { rankFindings } from "@/components/sharing/shared-finding";
import { ShareMap } from "@/components/map/share-map";
import { linesOfPlace } from "@/lib/map-state/place-lines";
import { Boundary } from "@/lib/schemas/geometry";
import type { SharedView } from "@/lib/schemas/shared";

/** The shape of the field as a geometry that can be drawn; null where it was not shared. */
export function sharedBoundary(view: SharedView): Polygon | MultiPolygon | null {
  const parsed = Boundary.safeParse(view.boundary);
  return parsed.success ? parsed.data : null;
}

/** The place that the gravest sentence with a place speaks of. */
export function sharedPlaces(view: SharedView): Position[][] {
  if (!view.verdict) return [];
  const speaking = rankFindings(view.verdict).filter((finding) => finding.severity !== "ok" && finding.place);
  return linesOfPlace(speaking[0]?.place);
}

/** Shared layers that can be drawn, the one that tells a landowner most first. */
const DRAWN_FIRST = ["margin", "resistance", "downforce", "depth"] as const;

/** The shared reading to draw; null where none was shared or the place is hidden (there are no tiles then). */
export function sharedChannel(view: SharedView): string | null {
  if (view.blurLocation || !view.log?.bbox) return null;
  const logged = view.log.channels.map((channel) => channel.id);
  return DRAWN_FIRST.find((layer) => view.layers.includes(layer) && logged.includes(layer)) ?? null;
}

/** The field from above, with the places that the sentences speak of: the shared reading on a map, or the outline alone. */
export function SharedMap({ view, token }: { view: SharedView; token: string }) {
  const boundary = sharedBoundary(view);
  const places = useMemo(() => sharedPlaces(view), [view]);
  const channel = sharedChannel(view);
  if (channel && view.log?.bbox) {
    return (
      <ShareMap
        token={token}
        fieldName={view.fieldName}
        channel={channel}
        boundary={boundary}
        bbox={view.log.bbox}
        places={places}
      />
    );
  }
  if (!boundary) return <p className="hatch p-6 text-ink-soft">The outline of the field was not shared.</p>;
  return (
    <figure className="sheet p-2">
      <BoundarySketch
        boundary={boundary}
        lines={places}
        className="mx-auto h-72 w-full print:h-56"
        label={`Outline of ${view.fieldName}, north up`}
      />
      <figcaption className="px-1 text-table text-ink-soft">
        North is up.{places.length > 0 ? " The thick line is the place to look at first." : ""}
      </figcaption>
    </figure>
  );
}
