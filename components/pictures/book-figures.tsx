"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useMemo } from "react";
import { useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import type { Classes } from "@/components/field-book/use-classes";
import { useOverview } from "@/components/field-book/use-log-data";
import type { Figure } from "@/components/pictures/figure";
import { figureElement } from "@/components/pictures/figure-element";
import { PictureButton } from "@/components/pictures/picture-button";
import { channelWords } from "@/lib/legend/channel-words";
import { classLabels } from "@/lib/pictures/class-labels";
import type { LegendEntry } from "@/lib/pictures/compose-picture";

const NOT_LOGGED: LegendEntry = { colour: null, label: "nothing logged" };

/** A map with what lies over it: the frame marked as a figure. */
function mapElement(map: MapLibreMap): HTMLElement | null {
  return map.getContainer().closest<HTMLElement>("[data-figure]");
}

interface FigureLook {
  id: string;
  order: number;
  subtitle: string;
  /** The colours need saying here. */
  hasLegend: boolean;
  map?: MapLibreMap;
}

/** A figure of the open channel, its classes as its legend. */
function useChannelFigure(classes: Classes | null, look: FigureLook): Figure {
  const channel = useBookState((state) => state.channel);
  const { data: overview } = useOverview(useLogVersion(), channel);
  const units = useChannelUnits(overview?.unit ?? "", channel);
  const { id, order, subtitle, hasLegend, map } = look;
  return useMemo(() => {
    const labels = classes && hasLegend ? classLabels(classes.edges, units) : [];
    const entries = labels.map((label, index) => ({ colour: classes?.colours[index] ?? null, label }));
    return {
      id,
      order,
      words: { title: channelWords(channel).name, unit: units.symbol, subtitle },
      legend: entries.length > 0 ? [...entries, NOT_LOGGED] : [],
      element: map ? () => mapElement(map) : figureElement(id),
      map,
    };
  }, [classes, units, channel, id, order, subtitle, hasLegend, map]);
}

export interface MapPictureProps {
  map: MapLibreMap;
  classes: Classes | null;
  /** What the map is called where there are several. */
  label?: string;
}

/** The picture of a row map, and the way to print the page. */
export function MapPicture({ map, classes, label }: MapPictureProps) {
  const figure = useChannelFigure(classes, {
    id: label ? `map ${label}` : "map",
    order: 1,
    subtitle: `${label ? `${label}: every` : "Every"} row's readings on the ground, north up.`,
    hasLegend: true,
    map,
  });
  return <PictureButton figure={figure} withPrint />;
}

export function LineUpPicture({ classes }: { classes: Classes | null }) {
  const figure = useChannelFigure(classes, {
    id: "line-up",
    order: 2,
    subtitle: "Rows from left to right looking forward: median, middle half, 5th to 95th percentile.",
    hasLegend: false,
  });
  return <PictureButton figure={figure} />;
}

export function PassPicture({ classes }: { classes: Classes | null }) {
  const pass = useBookState((state) => state.pass);
  const figure = useChannelFigure(classes, {
    id: "unrolled-pass",
    order: 3,
    subtitle: pass === null ? "" : `Pass ${pass}, unrolled: rows side by side, distance along the pass.`,
    hasLegend: true,
  });
  return <PictureButton figure={figure} />;
}
