"use client";

import { useSyncExternalStore } from "react";
import { formatDay } from "@/components/ui/format-date";

const never = () => () => undefined;

/** A day in the reader's own time zone. The server, which does not know that zone, writes it in UTC first. */
export function LocalDay({ instant }: { instant: string }) {
  const day = useSyncExternalStore(
    never,
    () => formatDay(instant),
    () => formatDay(instant, "UTC"),
  );
  return <time dateTime={instant}>{day}</time>;
}
