"use client";

import { Focus } from "lucide-react";
import { useShowOnMap } from "@/components/field-book/keys/use-show-on-map";

/** The map follows to the pass only when asked. */
export function ShowOnMap() {
  const showOnMap = useShowOnMap();
  return (
    <button
      type="button"
      aria-label="Show on the map"
      title="Show on the map (m)"
      onClick={showOnMap}
      className="grid size-11 place-items-center rounded hover:bg-sheet md:size-8"
    >
      <Focus size={18} aria-hidden />
    </button>
  );
}
