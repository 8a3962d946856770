import { stopReading } from "@/lib/ingest/ingest-error";
import {
  READ_LIMITS,
  type CrsCandidate,
  type FoundColumn,
  type Inspection,
  type LoggedDevice,
  type LogLayer,
} from "@/lib/ingest/log-format";
import type { LogNote } from "@/lib/logs/machine-log";
import type { LogShape } from "@/lib/ingest/mapping";

/** The log of a file that a mapping means. Stops with `several-layers` or `unknown-layer`. */
export function chooseLayer<T extends { id: string }>(
  layers: readonly T[],
  wanted: string | undefined,
  name: string,
): T {
  const ids = layers.slice(0, 4).map((layer) => `"${layer.id}"`);
  const named = `${ids.join(", ")}${layers.length > 4 ? ", …" : ""}`;
  const [first, second] = layers;
  if (wanted === undefined) {
    if (first && !second) return first;
    stopReading(
      "several-layers",
      `"${name}" holds ${layers.length} logs (${named}). Choose one: give the mapping the layer to read.`,
    );
  }
  const found = layers.find((layer) => layer.id === wanted);
  if (found) return found;
  stopReading("unknown-layer", `"${name}" holds no log "${wanted}" (it has ${named}). Choose one of those.`);
}

export interface InspectedLayer {
  id: string;
  label: string;
  records: number;
  shape: LogShape;
  crs?: string;
  crsCandidates?: CrsCandidate[];
  device?: LoggedDevice;
  example?: string[];
  columns: FoundColumn[];
  /** Others of the list taken together: a choice, but no further log. */
  isJoined?: boolean;
}

/** What an inspection says of the logs in a file: the longest first, all of them named where there are several. */
export function describeLayers(
  inspected: readonly InspectedLayer[],
): Pick<Inspection, "shape" | "columns" | "layers" | "crs" | "crsCandidates" | "example"> & { notes: LogNote[] } {
  const layers = keepListed([...inspected].sort((a, b) => b.records - a.records));
  const left = inspected.length - layers.length;
  const [first] = layers;
  const crs = first?.crs === undefined ? {} : { crs: first.crs };
  const candidates = first?.crsCandidates ? { crsCandidates: first.crsCandidates } : {};
  const example = first?.example ? { example: first.example } : {};
  const one = { shape: first?.shape ?? "single", columns: first?.columns ?? [], ...crs, ...candidates, ...example };
  if (layers.length < 2) return { ...one, notes: [] };
  const unlisted = left === 0 ? "" : ` The ${left} shortest are not listed: there are too many columns.`;
  const count = inspected.filter(({ isJoined }) => !isJoined).length;
  const message = `The file holds ${count} logs; choose which to read. The columns shown are those of "${first?.label ?? ""}", the longest.${unlisted}`;
  return { ...one, layers, notes: [{ code: "several-layers", count, message }] };
}

/** The first, and as many more as the list may hold. Without what only the inspecting format needs. */
function keepListed(inspected: readonly InspectedLayer[]): LogLayer[] {
  let columns = 0;
  return inspected
    .filter((layer, index) => (columns += layer.columns.length) <= READ_LIMITS.listedColumns || index === 0)
    .map(({ id, label, records, shape, crs, crsCandidates, device, example, columns: own }) => ({
      id,
      label,
      records,
      shape,
      ...(crs === undefined ? {} : { crs }),
      ...(crsCandidates === undefined ? {} : { crsCandidates }),
      ...(device === undefined ? {} : { device }),
      ...(example === undefined ? {} : { example }),
      columns: own,
    }));
}
