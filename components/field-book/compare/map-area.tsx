"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import dynamic from "next/dynamic";
import { useState } from "react";
import { useSecondBook } from "@/components/field-book/compare/second-book";
import { useBookState } from "@/components/field-book/field-book-context";
import { RowMap, type RowMapProps } from "@/components/field-book/row-map";

const SecondMap = dynamic(() => import("@/components/field-book/compare/second-map").then((found) => found.SecondMap), {
  ssr: false,
});

const HALF = "absolute inset-x-0 top-0 h-1/2 md:inset-y-0 md:left-0 md:right-auto md:h-auto md:w-1/2";

/** The map, and the one it is compared with over it or beside it. The first is never drawn anew by comparing. */
export function MapArea(props: RowMapProps) {
  const second = useSecondBook();
  const mode = useBookState((state) => state.comparison?.mode);
  const [map, setMap] = useState<MapLibreMap | null>(null);
  const isBeside = second !== null && mode === "side";
  return (
    <div className="relative h-full overflow-hidden">
      <div className={isBeside ? HALF : "absolute inset-0"}>
        <RowMap {...props} onMap={setMap} />
      </div>
      {second && mode ? <SecondMap {...props} mode={mode} firstMap={map} /> : null}
    </div>
  );
}
