"use client";

import { useEffect } from "react";

/** While `isBusy`, the browser asks in its own words whether to leave the page. */
export function useAskBeforeLeaving(isBusy: boolean): void {
  useEffect(() => {
    if (!isBusy) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener("beforeunload", ask);
    return () => window.removeEventListener("beforeunload", ask);
  }, [isBusy]);
}
