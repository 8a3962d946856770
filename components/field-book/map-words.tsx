"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useMemo } from "react";
import { useBookState } from "@/components/field-book/field-book-context";
import { useChannelUnits } from "@/components/field-book/use-channel-units";
import type { Classes } from "@/components/field-book/use-classes";
import { useUnits } from "@/components/units/use-units";
import { channelWords } from "@/lib/legend/channel-words";
import { sharesOfClasses } from "@/lib/legend/value-distribution";
import type { MapView } from "@/lib/map-state/field-book-store";
import { worldPerMetre } from "@/lib/tiles/tile-address";
import { formatQuantity } from "@/lib/units/format-quantity";

const TILE_PX = 512;

export interface MapWordsProps {
  map: Pick<MapLibreMap, "getContainer">;
  classes: Classes | null;
  /** SI unit of the channel. */
  unit: string;
}

/** What the map shows now, for those who hear it: where, how much ground, which classes, what is chosen. */
export function MapWords({ map, classes, unit }: MapWordsProps) {
  const { format } = useUnits();
  const view = useBookState((state) => state.view);
  const channel = useBookState((state) => state.channel);
  const row = useBookState((state) => state.row);
  const pass = useBookState((state) => state.pass);
  const units = useChannelUnits(unit, channel);
  const classWords = useMemo(
    () => (classes && classes.context.channel === channel ? sayClasses(classes, units.format) : null),
    [classes, channel, units.format],
  );
  const box = map.getContainer();
  const size = view ? groundSize(view, box.clientWidth, box.clientHeight) : null;
  return (
    <p className="sr-only" data-testid="map-words">
      {size && view
        ? `The map shows ${format(size.widthM, "m")} by ${format(size.heightM, "m")} around ${sayPlace(view)}. `
        : ""}
      {classWords ? `${channelWords(channel).name} in the whole log, by distance: ${classWords}. ` : ""}
      {pass === null ? "" : `Pass ${pass} is unrolled below. `}
      {row === null ? "No row is chosen." : `Row ${row} is outlined.`}
    </p>
  );
}

function groundSize({ latitude, zoom }: MapView, widthPx: number, heightPx: number) {
  const { east, north } = worldPerMetre(latitude);
  const worldPx = TILE_PX * 2 ** zoom;
  return { widthM: widthPx / worldPx / east, heightM: heightPx / worldPx / north };
}

function sayPlace({ latitude, longitude }: MapView): string {
  const north = `${Math.abs(latitude).toFixed(5)}° ${latitude < 0 ? "south" : "north"}`;
  return `${north}, ${Math.abs(longitude).toFixed(5)}° ${longitude < 0 ? "west" : "east"}`;
}

/** "3 % under 56 lbf, 20 % from 56 lbf to 79 lbf, …"; null where no distances are known. */
function sayClasses({ edges, context }: Classes, format: (valueSi: number) => string): string | null {
  if (!context.distribution) return null;
  const shares = sharesOfClasses(context.distribution, edges);
  return shares
    .map((share, at) => {
      const [from, to] = [edges[at - 1], edges[at]];
      const words = formatQuantity(share, "fraction", "metric", { decimals: 0 }).text;
      if (from === undefined) return `${words} under ${format(to ?? NaN)}`;
      return to === undefined ? `${words} from ${format(from)} up` : `${words} from ${format(from)} to ${format(to)}`;
    })
    .join(", ");
}
