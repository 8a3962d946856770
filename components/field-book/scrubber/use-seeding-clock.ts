"use client";

import { useMemo } from "react";
import { useBook, useLogVersion } from "@/components/field-book/field-book-context";
import { usePasses } from "@/components/field-book/use-log-data";
import { buildWorkClock, type WorkClock } from "@/lib/map-state/work-clock";

/** The time at work in the open log; null until its passes are here, and where they carry no times. */
export function useSeedingClock(): WorkClock | null {
  const { log } = useBook();
  const { data: passes } = usePasses(useLogVersion());
  return useMemo(() => (passes ? buildWorkClock(passes, log.startedAt) : null), [passes, log.startedAt]);
}
