import { HydrationBoundary } from "@tanstack/react-query";
import type { ReactNode } from "react";
import { knowField } from "@/app/_server/know-field";
import { orNotFound, requireScope } from "@/app/_server/require-scope";
import { MapAhead } from "@/components/map/map-ahead";

interface RowsLayoutProps {
  children: ReactNode;
  params: Promise<{ org: string; fieldId: string }>;
}

/** What the rows ask for first thing comes with the page, and the map library is fetched while they ask for the rest. */
export default async function RowsLayout({ children, params }: RowsLayoutProps) {
  const { org, fieldId } = await params;
  const { scope } = await requireScope(org);
  return (
    <HydrationBoundary state={await orNotFound(knowField(scope, fieldId))}>
      <MapAhead />
      {children}
    </HydrationBoundary>
  );
}
