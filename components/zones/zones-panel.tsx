"use client";

import { Download } from "lucide-react";
import { useState } from "react";
import { useBook, useBookState, useLogVersion } from "@/components/field-book/field-book-context";
import { Button, buttonClass } from "@/components/ui/button";
import { CheckField } from "@/components/ui/check-field";
import { DataTable } from "@/components/ui/data-table";
import { Menu, MenuLink } from "@/components/ui/menu";
import { useUnits } from "@/components/units/use-units";
import { patchColumns } from "@/components/zones/patch-columns";
import { limitZonesPath, useLimitZones } from "@/components/zones/use-limit-zones";
import { useSeePatch } from "@/components/zones/use-see-patch";
import { HATCH_WORDS, KIND_WORDS, kindsOf, sayRows, sayThreshold, sayTotals } from "@/components/zones/zone-words";
import { describeFailure } from "@/lib/api/api-problem";
import { exportPath } from "@/lib/export/export-path";
import { zonesAmong } from "@/lib/map-state/ground-layers";
import type { LimitZoneKind, LimitZonesBody } from "@/lib/schemas/limit-zones";

/** Where rows were past a limit: how much ground, patch by patch, on the map and as files. */
export function ZonesPanel() {
  const { log } = useBook();
  const shown = useBookState((state) => zonesAmong(state.ground)[0]);
  const kinds = kindsOf(log.channels);
  const [chosen, setChosen] = useState<LimitZoneKind | undefined>(shown && kinds.includes(shown) ? shown : kinds[0]);
  if (!chosen) {
    return (
      <p className="px-4 py-4 text-ink-soft">
        Zones need the margin, the applied force or the depth of each row; this log has none of them.
      </p>
    );
  }
  return (
    <section aria-label="Zones" className="flex h-full min-h-0 flex-col gap-2 px-4 pb-2 pt-3">
      <label className="flex flex-wrap items-center gap-2">
        <span className="text-table text-ink-soft">Rows</span>
        <select
          value={chosen}
          onChange={(event) => setChosen(event.target.value as LimitZoneKind)}
          className="min-h-11 rounded border border-edge bg-sheet px-2 md:min-h-8"
        >
          {kinds.map((kind) => (
            <option key={kind} value={kind}>
              {KIND_WORDS[kind].toLowerCase()}
            </option>
          ))}
        </select>
      </label>
      <ZonesOfKind key={chosen} kind={chosen} />
    </section>
  );
}

function ZonesOfKind({ kind }: { kind: LimitZoneKind }) {
  const { store } = useBook();
  const zones = useLimitZones(useLogVersion(), kind, true);
  const isShown = useBookState((state) => state.ground.includes(kind));
  if (zones.isError) {
    return (
      <p role="alert" className="text-ink-soft">
        {describeFailure(zones.error)}
      </p>
    );
  }
  if (!zones.data)
    return <div className="hatch min-h-40 flex-1 opacity-60" role="status" aria-label="Looking for zones" />;
  return (
    <>
      <ZoneTotals body={zones.data} />
      <div className="flex flex-wrap items-center justify-between gap-2">
        <CheckField
          label={`Show on the map (${HATCH_WORDS[kind]})`}
          checked={isShown}
          onChange={() => store.getState().toggleGround(kind)}
        />
        <ZoneFiles kind={kind} />
      </div>
      <div className="min-h-0 flex-1 overflow-auto">
        <PatchTable body={zones.data} />
      </div>
    </>
  );
}

function ZoneTotals({ body }: { body: LimitZonesBody }) {
  const { system } = useUnits();
  return (
    <p className="text-table text-ink-soft" role="status">
      {sayTotals(body, system)} Counted: {sayThreshold(body, system)}.
    </p>
  );
}

function PatchTable({ body }: { body: LimitZonesBody }) {
  const { log } = useBook();
  const { system } = useUnits();
  const see = useSeePatch();
  if (body.patches.length === 0) return null;
  return (
    <DataTable
      caption={`Patches ${KIND_WORDS[body.kind].toLowerCase()}, the largest first`}
      rows={body.patches}
      columns={patchColumns(body, system)}
      rowId={({ patch }) => String(patch)}
      fileName={`zones-${body.kind}-${log.name.replaceAll(/[^\w]+/g, "-")}`}
      actions={(patch) => (
        <Button kind="quiet" aria-label={`See ${sayRows(patch)} of pass ${patch.pass}`} onClick={() => see(patch)}>
          See
        </Button>
      )}
    />
  );
}

/** Classes of the map that hold the same zones, where there are such. */
const CLASSES: Partial<Record<LimitZoneKind, string>> = { "under-target": "underTarget", "at-limit": "atLimit" };

function ZoneFiles({ kind }: { kind: LimitZoneKind }) {
  const version = useLogVersion();
  const channel = CLASSES[kind];
  const { logId, cleaned } = version;
  return (
    <Menu
      trigger={
        <button type="button" className={buttonClass("quiet", "px-2")} aria-label="Save polygons of these zones">
          <Download size={16} strokeWidth={1.5} aria-hidden />
          Save polygons
        </button>
      }
    >
      <MenuLink href={limitZonesPath(version, kind)} download>
        GeoJSON, these zones
      </MenuLink>
      {channel
        ? (["geopackage", "shapefile"] as const).map((format) => (
            <MenuLink
              key={format}
              href={exportPath(logId, { format, level: "zones", zones: { channel, edges: [0.5] }, cleaned })}
              download
            >
              {format === "geopackage" ? "GeoPackage" : "Shapefile"}, class 1 of 0 and 1
            </MenuLink>
          ))
        : null}
    </Menu>
  );
}
