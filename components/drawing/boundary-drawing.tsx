"use client";

import dynamic from "next/dynamic";
import { useState } from "react";
import type { BoundaryMapProps } from "@/components/drawing/boundary-map";
import { useFields } from "@/components/hooks/use-fields";
import { Loading } from "@/components/ui/loading";
import { boundsOfGeometry, openBounds } from "@/lib/map-state/geometry-bounds";
import type { Bounds } from "@/lib/map-state/field-book-store";
import type { Field } from "@/lib/schemas/fields";
import type { Boundary } from "@/lib/schemas/geometry";

/** Map and drawing are fetched by those who draw. */
const LazyBoundaryMap = dynamic(
  () => import("@/components/drawing/boundary-map").then(({ BoundaryMap }) => BoundaryMap),
  { ssr: false, loading: () => <Loading what="the map" /> },
);

/** Where a map opens that knows no field: all land. */
const ALL_LAND: Bounds = [-180, -60, 180, 75];
/** Fields farther apart than this are not beside each other: the map opens at one of them. */
const WIDEST_DEGREES = 1;

export interface BoundaryDrawingProps extends Pick<BoundaryMapProps, "basemap" | "start" | "onBoundary"> {
  /** The field whose boundary it is, so that it is not taken for its own neighbour. */
  fieldId?: string;
}

/** The map to draw a boundary on, opened at the field or at the fields already there. */
export function BoundaryDrawing({ fieldId, start, ...rest }: BoundaryDrawingProps) {
  const fields = useFields();
  if (fields.isPending) return <Loading what="the fields beside it" />;
  const others = (fields.data?.items ?? []).filter(({ id }) => id !== fieldId);
  return <Opened start={start} others={others} {...rest} />;
}

type OpenedProps = Omit<BoundaryDrawingProps, "fieldId"> & { others: readonly Field[] };

function Opened({ start, others, ...rest }: OpenedProps) {
  // What is drawn on stays as it was opened, whatever is fetched anew behind it.
  const [opening] = useState(() => {
    const neighbours = others.flatMap(({ boundary }) => (boundary ? [boundary] : []));
    return { start, neighbours, bounds: drawingBounds(start, neighbours) };
  });
  return <LazyBoundaryMap {...rest} {...opening} />;
}

/** The boundary itself, else the fields around, else the first of them, else all land. */
export function drawingBounds(start: Boundary | null, neighbours: readonly Boundary[]): Bounds {
  const own = boundsOfGeometry(start);
  if (own) return openBounds(own, 0.1);
  const all = boundsOfGeometry({ geometries: neighbours });
  if (!all) return ALL_LAND;
  const isNear = all[2] - all[0] <= WIDEST_DEGREES && all[3] - all[1] <= WIDEST_DEGREES;
  return openBounds((isNear ? all : boundsOfGeometry(neighbours[0])) ?? all, 0.25);
}
