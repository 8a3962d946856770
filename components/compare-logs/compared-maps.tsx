"use client";

import type { Map as MapLibreMap } from "maplibre-gl";
import { useEffect, useState } from "react";
import { ComparedMap } from "@/components/compare-logs/compared-map";
import { useBookState } from "@/components/field-book/field-book-context";
import { Legend } from "@/components/field-book/legend";
import { useClasses } from "@/components/field-book/use-classes";
import { useOverview } from "@/components/field-book/use-log-data";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { lockMaps } from "@/components/map/lock-maps";
import type { Field } from "@/lib/schemas/fields";
import type { Log } from "@/lib/schemas/logs";

export interface ComparedMapsProps {
  before: { field: Field; log: Log };
  after: { field: Field; log: Log };
  basemap: BasemapConfig;
}

/** Both logs on the ground in one set of classes; in one field the two maps move as one. */
export function ComparedMaps({ before, after, basemap }: ComparedMapsProps) {
  const channel = useBookState((state) => state.channel);
  const { id: logId, version, revision } = before.log;
  const { data: overview } = useOverview({ logId, version, revision }, channel);
  const classes = useClasses(channel, overview);
  const [left, setLeft] = useState<MapLibreMap | null>(null);
  const [right, setRight] = useState<MapLibreMap | null>(null);
  const isOneField = before.field.id === after.field.id;
  useEffect(() => (left && right && isOneField ? lockMaps(left, right) : undefined), [left, right, isOneField]);
  const shared = { channel, classes, basemap };
  return (
    <section aria-labelledby="compared-maps" className="space-y-3">
      <h2 id="compared-maps" className="text-section">
        On the ground
      </h2>
      <div className="grid gap-3 md:grid-cols-2">
        <ComparedMap key={before.log.id} title="Before" {...before} {...shared} onMap={setLeft} />
        <ComparedMap key={after.log.id} title="After" {...after} {...shared} onMap={setRight} />
      </div>
      <Legend classes={classes} unit={overview?.unit ?? ""} />
    </section>
  );
}
