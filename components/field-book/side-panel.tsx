"use client";

import { LineUp } from "@/components/field-book/line-up";
import { LineUpTable } from "@/components/field-book/line-up-table";
import { PassesPanel, PassesTable } from "@/components/field-book/passes/load-passes";
import { SideTabs } from "@/components/field-book/side-tabs";
import { ZonesPanel } from "@/components/zones/load-zones";
import type { Classes } from "@/components/field-book/use-classes";
import type { RowStatisticsBody } from "@/lib/schemas/logs";

/** Tables that can lie over the map. */
export type SideTableName = "rows" | "passes";

export interface SidePanelProps {
  statistics: RowStatisticsBody | undefined;
  classes: Classes | null;
  onTable: (name: SideTableName) => void;
}

/** What the log holds, compared by rows or by passes, and where rows were past a limit. */
export function SidePanel({ statistics, classes, onTable }: SidePanelProps) {
  const lineUp = <LineUp statistics={statistics} classes={classes} onTable={() => onTable("rows")} />;
  return (
    <SideTabs
      tabs={[
        { id: "rows", label: "Rows", content: lineUp },
        { id: "passes", label: "Passes", content: <PassesPanel onTable={() => onTable("passes")} /> },
        { id: "zones", label: "Zones", content: <ZonesPanel /> },
      ]}
    />
  );
}

export interface SideTableProps {
  name: SideTableName;
  statistics: RowStatisticsBody | undefined;
  onClose: () => void;
}

/** The numbers behind a panel. */
export function SideTable({ name, statistics, onClose }: SideTableProps) {
  if (name === "passes") return <PassesTable onClose={onClose} />;
  return statistics ? <LineUpTable statistics={statistics} onClose={onClose} /> : null;
}
