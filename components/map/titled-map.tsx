"use client";

import type { ReactNode } from "react";
import { MapCanvas, type MapCanvasProps } from "@/components/map/map-canvas";

export interface TitledMapProps extends Pick<MapCanvasProps, "basemap" | "bounds" | "label" | "description" | "onMap"> {
  title: ReactNode;
  /** Its readings could not be fetched. */
  isTrouble: boolean;
}

/** A map with its title on a sheet of its own; one of two that are held beside each other. */
export function TitledMap({ title, isTrouble, ...map }: TitledMapProps) {
  return (
    <figure className="sheet min-w-0">
      <figcaption className="truncate px-3 py-2 font-semibold">{title}</figcaption>
      {isTrouble ? (
        <p role="alert" className="px-3 pb-2 text-table text-clay">
          The readings could not be fetched; reload the page.
        </p>
      ) : null}
      <div className="h-80 border-t border-rule md:h-96">
        <MapCanvas {...map} gentle />
      </div>
    </figure>
  );
}
