"use client";

import { Download } from "lucide-react";
import { buttonClass } from "@/components/ui/button";
import { formatBytes } from "@/components/ui/format-date";
import { Menu, MenuGroup, MenuLink, MenuRule } from "@/components/ui/menu";
import { estimateReadingsBytes } from "@/lib/export/estimate-size";
import { exportPath, type ExportChoice } from "@/lib/export/export-path";
import type { ExportFormat, ExportShape } from "@/lib/export/export-table";
import { channelWords } from "@/lib/legend/channel-words";
import type { Log } from "@/lib/schemas/logs";

export interface ExportMenuProps {
  log: Log;
  /** Classes of the channel that is looked at, in SI; null where none is. */
  zones?: ExportChoice["zones"] | null;
  /** False: files of the log as it was read. */
  cleaned?: boolean;
}

interface Line {
  format: ExportFormat;
  shape: ExportShape;
  words: string;
}

const READINGS: readonly Line[] = [
  { format: "csv", shape: "long", words: "CSV, one line a row" },
  { format: "csv", shape: "wide", words: "CSV, one line a record" },
  { format: "geopackage", shape: "long", words: "GeoPackage" },
  { format: "shapefile", shape: "long", words: "Shapefile" },
  { format: "geojson", shape: "long", words: "GeoJSON" },
  { format: "arrow", shape: "long", words: "Arrow" },
];

const POLYGONS: readonly Line[] = READINGS.filter(({ format }) =>
  ["geopackage", "shapefile", "geojson"].includes(format),
);

/** What of a log may be taken away as a file. The browser shows how the download goes. */
export function ExportMenu({ log, zones, cleaned = true }: ExportMenuProps) {
  return (
    <Menu
      trigger={
        <button type="button" className={buttonClass("quiet", "max-md:px-3")} aria-label={`Export ${log.name}`}>
          <Download size={16} strokeWidth={1.5} aria-hidden />
          Export
        </button>
      }
    >
      <MenuGroup
        title={`Readings ${cleaned ? "as shown: with the cleaning rules" : "as logged"}; units and notes inside`}
      >
        {linesOf(log).map((line) => (
          <MenuLink
            key={line.format + line.shape}
            href={exportPath(log.id, { ...line, level: "readings", cleaned })}
            download
          >
            {line.words}
            <span className="ml-auto pl-6 text-table text-ink-soft">{sizeWords(log, line)}</span>
          </MenuLink>
        ))}
      </MenuGroup>
      {zones ? (
        <Polygons
          log={log}
          title={`Zones of ${channelWords(zones.channel).name}, as coloured`}
          zones={zones}
          cleaned={cleaned}
        />
      ) : null}
      <Polygons log={log} title="Ground of each pass" cleaned={cleaned} />
    </Menu>
  );
}

interface PolygonsProps {
  log: Log;
  title: string;
  zones?: ExportChoice["zones"];
  cleaned: boolean;
}

function Polygons({ log, title, zones, cleaned }: PolygonsProps) {
  return (
    <>
      <MenuRule />
      <MenuGroup title={title}>
        {POLYGONS.map(({ format, words }) => (
          <MenuLink
            key={format}
            href={exportPath(log.id, { format, level: zones ? "zones" : "swaths", zones, cleaned })}
            download
          >
            {words}
          </MenuLink>
        ))}
      </MenuGroup>
    </>
  );
}

/** A log without rows has one line a record in either shape. */
function linesOf({ channels }: Log): readonly Line[] {
  return channels.some((channel) => channel.perRow) ? READINGS : READINGS.filter((_, index) => index > 0);
}

/** One digit that counts: the size is a guess. */
function sizeWords({ counts, channels }: Log, { format, shape }: Line): string {
  const bytes = estimateReadingsBytes({ ...counts, channels, format, shape, isBundle: true });
  return `about ${formatBytes(Number(bytes.toPrecision(1))).replace(/\.0(?=\D)/, "")}`;
}
