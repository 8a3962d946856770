"use client";

import dynamic from "next/dynamic";

/** Fetched when somebody asks for zones. */
export const ZonesPanel = dynamic(() => import("@/components/zones/zones-panel").then((module) => module.ZonesPanel), {
  ssr: false,
  loading: () => <div className="hatch h-full min-h-40 opacity-60" role="status" aria-label="Looking for zones" />,
});
