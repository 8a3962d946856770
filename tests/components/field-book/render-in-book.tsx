import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { cleanup, render } from "@testing-library/react";
import { afterEach, vi } from "vitest";
import type { ReactNode } from "react";
import { FieldBookProvider } from "@/components/field-book/field-book-context";
import { UnitsProvider, type UnitSystemName } from "@/components/units/use-units";
import { createFieldBookStore, type FieldBookState } from "@/lib/map-state/field-book-store";
import type { Log, RowStatisticsBody, RowStatisticsItem } from "@/lib/schemas/logs";

// Each test begins on an empty page.
afterEach(cleanup);

export const LOG: Log = {
  id: "log_east",
  fieldId: "fld_east",
  name: "East quarter, first day",
  kind: "seeding",
  status: "ready",
  progress: 1,
  stage: "Ready",
  error: null,
  notes: [],
  counts: { records: 1200, rows: 8, readings: 9600, flagged: 0, rejected: 0, passes: 6 },
  channels: [
    { id: "downforce", unit: "N", min: 300, max: 1500, perRow: true },
    { id: "margin", unit: "N", min: -50, max: 900, perRow: true },
    { id: "resistance", unit: "N", min: 800, max: 2400, perRow: true },
    { id: "depth", unit: "m", min: 0.02, max: 0.06, perRow: true },
    { id: "speed", unit: "m/s", min: 1, max: 3, perRow: false },
  ],
  startedAt: "2031-09-24T14:05:00.000Z",
  endedAt: "2031-09-24T16:05:00.000Z",
  bbox: [-98.62, 38.41, -98.6, 38.42],
  machineId: null,
  mappingId: null,
  fileName: "east-quarter.csv",
  fileBytes: 1000,
  sha256: "0".repeat(64),
  version: 1,
  createdAt: "2031-09-25T08:00:00.000Z",
};

function rowItem(row: number): RowStatisticsItem {
  const worn = row === 5;
  const p50 = worn ? 300 : 440 + row;
  return {
    row,
    n: 1200,
    distanceM: 1450.5,
    mean: p50 + 0.5,
    sd: 42,
    min: p50 - 200,
    p05: p50 - 80,
    p25: p50 - 30,
    p50,
    p75: p50 + 30,
    p95: p50 + 80,
    max: p50 + 200,
    shareUnderTarget: worn ? 0.81 : 0.02,
    shareAtLimit: null,
    shareContactLost: 0,
    longestUnderTargetM: worn ? 54 : 1.5,
    deviationZ: worn ? -6.2 : 0.3,
    flagged: worn,
    reason: worn ? "=lower than the others" : null,
  };
}

export const STATISTICS: RowStatisticsBody = {
  channel: "margin",
  unit: "N",
  items: Array.from({ length: 8 }, (_, index) => rowItem(index + 1)),
};

/** Renders inside an open field's book and gives its store back. */
export function renderInBook(
  children: ReactNode,
  {
    state,
    system = "metric",
    log: part = {},
  }: { state?: Partial<FieldBookState>; system?: UnitSystemName; log?: Partial<Log> } = {},
) {
  const store = createFieldBookStore(state);
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  const log = { ...LOG, ...part };
  const book = { store, log, logVersion: { logId: LOG.id, version: LOG.version } };
  const view = render(
    <QueryClientProvider client={client}>
      <UnitsProvider start={system} keep={false}>
        <FieldBookProvider book={book}>{children}</FieldBookProvider>
      </UnitsProvider>
    </QueryClientProvider>,
  );
  return { store, client, ...view };
}

/** jsdom lays nothing out: gives every element this size, and says so to whoever observes. */
export function giveElementsSize(width: number, height: number): void {
  Object.defineProperty(HTMLElement.prototype, "clientWidth", { configurable: true, get: () => width });
  Object.defineProperty(HTMLElement.prototype, "clientHeight", { configurable: true, get: () => height });
  HTMLElement.prototype.getBoundingClientRect = () => new DOMRect(0, 0, width, height);
  vi.stubGlobal(
    "ResizeObserver",
    class {
      constructor(private readonly tell: (entries: readonly []) => void) {}
      observe() {
        this.tell([]);
      }
      unobserve() {}
      disconnect() {}
    },
  );
}
