import type { MultiPolygon, Polygon } from "geojson";
import { BoundarySketch } from "@/components/fields/boundary-sketch";
import { Boundary } from "@/lib/schemas/geometry";
import type { SharedView } from "@/lib/schemas/shared";

/** The shape of the field as a geometry that can be drawn; null where it was not shared. */
export function sharedBoundary(view: SharedView): Polygon | MultiPolygon | null {
  const parsed = Boundary.safeParse(view.boundary);
  return parsed.success ? parsed.data : null;
}

/** The field from above. */
export function SharedMap({ view }: { view: SharedView; token: string }) {
  const boundary = sharedBoundary(view);
  if (!boundary) return <p className="hatch p-6 text-ink-soft">The outline of the field was not shared.</p>;
  return (
    <figure className="sheet p-2">
      <BoundarySketch
        boundary={boundary}
        className="mx-auto h-64 w-full print:h-52"
        label={`Outline of ${view.fieldName}, north up`}
      />
      <figcaption className="px-1 text-table text-ink-soft">North is up.</figcaption>
    </figure>
  );
}
