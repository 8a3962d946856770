"use client";

import type { ShapeGeometry } from "@/components/drawing/drawing";
import { useUnits } from "@/components/units/use-units";
import { measureShape } from "@/lib/drawing/measure-shape";

/** How long and how large a shape is, in the person's units, while it is drawn and after. */
export function MeasureWords({ geometry, isOpen = false }: { geometry: ShapeGeometry; isOpen?: boolean }) {
  const { format } = useUnits();
  if (geometry.type === "Point") return null;
  const { lengthM, lastSideM, areaM2 } = measureShape(geometry);
  const parts = [
    areaM2 === null ? null : `area ${format(areaM2, "m2")}`,
    `${areaM2 === null ? "length" : "outline"} ${format(lengthM, "m", "distance")}`,
    // After a tap there is no pointer to lead a side to.
    isOpen && lastSideM !== null && lastSideM > 0 ? `last side ${format(lastSideM, "m", "distance")}` : null,
  ];
  return <span className="tabular">{parts.filter((part) => part !== null).join(" · ")}</span>;
}
