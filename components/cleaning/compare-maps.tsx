"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useState } from "react";
import { CompareMap } from "@/components/cleaning/compare-map";
import { lockMaps } from "@/components/map/lock-maps";
import { ReasonLegend } from "@/components/cleaning/reason-legend";
import { channelsOf, ChannelSwitch } from "@/components/field-book/channel-switch";
import { FieldBookProvider, useBook, useBookState } from "@/components/field-book/field-book-context";
import { Legend } from "@/components/field-book/legend";
import { openingBounds } from "@/components/field-book/opening-bounds";
import { useClasses } from "@/components/field-book/use-classes";
import { useOverview } from "@/components/field-book/use-log-data";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { createFieldBookStore, type Bounds } from "@/lib/map-state/field-book-store";
import type { Cleaning } from "@/lib/schemas/cleaning";
import type { Field } from "@/lib/schemas/fields";
import type { Log } from "@/lib/schemas/logs";

export interface CompareMapsProps {
  field: Field;
  log: Log;
  /** The rules in force: a map of rules that are only tried would have to be worked out first. */
  cleaning: Cleaning;
  basemap: BasemapConfig;
  /** Rules were changed and are not in force. */
  isDraft: boolean;
}

/** The log as it was read beside the log with the rules in force; the two maps move as one. */
export function CompareMaps(props: CompareMapsProps) {
  const { log, cleaning } = props;
  const [store] = useState(() => createFieldBookStore({ channel: channelsOf(log)[0] ?? "rowSpeed" }));
  const { revision } = cleaning;
  const book = { store, log, logVersion: { logId: log.id, version: log.version, revision } };
  return (
    <FieldBookProvider book={book}>
      <TwoMaps {...props} />
    </FieldBookProvider>
  );
}

function TwoMaps({ field, log, cleaning, basemap, isDraft }: CompareMapsProps) {
  const { logVersion } = useBook();
  const channel = useBookState((state) => state.channel);
  // One set of classes for both, so that a colour means the same left and right.
  const { data: overview } = useOverview({ ...logVersion, cleaned: false }, channel);
  const classes = useClasses(channel, overview);
  const [bounds] = useState<Bounds>(() => openingBounds(field, log));
  const [left, setLeft] = useState<MapLibreMap | null>(null);
  const [right, setRight] = useState<MapLibreMap | null>(null);
  useEffect(() => (left && right ? lockMaps(left, right) : undefined), [left, right]);
  const shared = { basemap, bounds, boundary: field.boundary, classes };
  return (
    <section aria-labelledby="compare-title" className="space-y-3">
      <h2 id="compare-title" className="text-section">
        Before and after
      </h2>
      {isDraft ? (
        <p className="max-w-prose text-table text-ink-soft">
          The right map shows the rules in force. The changed ones show there once they are in use.
        </p>
      ) : null}
      <ChannelSwitch />
      <div className="grid gap-3 md:grid-cols-2">
        <CompareMap title="As logged" cleaned={false} onMap={setLeft} {...shared} />
        <CompareMap title="With the rules in force" cleaned onMap={setRight} {...shared} />
      </div>
      <ReasonLegend items={cleaning.items} />
      <Legend classes={classes} unit={overview?.unit ?? ""} />
    </section>
  );
}
