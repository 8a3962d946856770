import type { Page } from "playwright-core";

declare global {
  interface Window {
    /** Longest event of each interaction since the last look, milliseconds to the paint after it. */
    slowestEventMs?: number;
  }
}

/** Shorter events are not told by the browser. */
const LEAST_TOLD_MS = 16;
/** What an interaction started must have come to rest. */
const REST_MS = 700;

/** Makes every page of a context note its interactions, by the Event Timing API. */
export async function noteInteractions(page: Page): Promise<void> {
  await page.addInitScript((leastMs) => {
    const observer = new PerformanceObserver((list) => {
      for (const entry of list.getEntries() as PerformanceEventTiming[]) {
        if (entry.interactionId) window.slowestEventMs = Math.max(window.slowestEventMs ?? 0, entry.duration);
      }
    });
    observer.observe({ type: "event", durationThreshold: leastMs, buffered: true } as PerformanceObserverInit);
  }, LEAST_TOLD_MS);
}

/** Milliseconds from an interaction to the next paint; below 16 where the browser does not tell. */
export async function timeInteraction(page: Page, act: () => Promise<void>): Promise<number> {
  await page.waitForTimeout(REST_MS);
  await page.evaluate(() => (window.slowestEventMs = 0));
  await act();
  await page.waitForTimeout(REST_MS);
  return Math.max(LEAST_TOLD_MS, await page.evaluate(() => window.slowestEventMs ?? 0));
}

/** The value that three quarters lie at or below: the nearest rank. */
export function upperQuartile(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.ceil(sorted.length * 0.75) - 1] ?? NaN;
}
