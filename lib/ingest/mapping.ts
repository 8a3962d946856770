import { z } from "zod";
import { fail, succeed, type Result } from "@/lib/result";
import { ingestError, type IngestError } from "@/lib/ingest/ingest-error";
import type { Inspection } from "@/lib/ingest/log-format";
import { KNOWN_CHANNELS, type ChannelId } from "@/lib/logs/channel";
import { plainText } from "@/lib/schemas/plain-text";
import { UNIT_IDS } from "@/lib/units/unit-table";

/** A channel a column may be mapped to: a known one or `other:<name>`. Derived channels are not logged. */
export const LoggedChannel = z.custom<ChannelId>(
  (value) =>
    typeof value === "string" &&
    ((KNOWN_CHANNELS as readonly string[]).includes(value) || /^other:[^/\\]{1,80}$/.test(value)),
  { message: "unknown channel" },
);

export const MappedColumn = z.object({
  name: z.string().min(1).max(500),
  channel: LoggedChannel,
  /** Row the column belongs to, 1 = leftmost looking forward. Wide files only. */
  row: z.number().int().min(1).max(1024).optional(),
  unit: z.enum(UNIT_IDS),
  /** `local`: the pattern of the time, such as `dd/MM/yyyy HH:mm:ss`; `bu/ac`: the bushel weight, `56 lb`; `row`: `from 0`; `contact`: `lost`. */
  format: z.string().trim().min(1).max(80).optional(),
  /** Values, in the column's own unit, that stand for "nothing here", such as -999. */
  missing: z.array(z.number().finite()).max(16).optional(),
});
export type MappedColumn = z.infer<typeof MappedColumn>;

export const LOG_SHAPES = ["wide", "long", "single"] as const;
export type LogShape = (typeof LOG_SHAPES)[number];

export const CONTACT_KINDS = ["share-of-time", "at-the-moment", "other"] as const;

/** How the log defines ground contact: files do not say, and logs of two kinds must not be compared. */
export const ContactDefinition = z.object({
  /** Share of a window of time under load, or a yes or no at the moment of the record. */
  kind: z.enum(CONTACT_KINDS),
  /** Load from which the wheel counts as touching. */
  thresholdN: z.number().finite().min(0).max(100_000).optional(),
  windowS: z.number().positive().max(600).optional(),
  /** In the words of whoever set the machine up. */
  words: plainText(300).optional(),
});
export type ContactDefinition = z.infer<typeof ContactDefinition>;

/** What the columns of a log mean. Columns not listed are not read. */
export const LogMapping = z.object({
  columns: z.array(MappedColumn).min(1).max(20_000),
  shape: z.enum(LOG_SHAPES),
  /** For easting and northing: `EPSG:32614`, `4326`, `3857`, or a proj4 string. */
  crs: z.string().trim().min(1).max(500).optional(),
  /** IANA name for `local` times, such as `America/Chicago`. */
  timeZone: z.string().trim().min(1).max(80).optional(),
  /** Which log of a file that holds several, by its id. */
  layer: z.string().min(1).max(500).optional(),
  /** How ground contact is defined in this log, as a person said. */
  contact: ContactDefinition.optional(),
  /** True where the file counts its rows from the right: they are turned round, so that row 1 is leftmost looking forward. */
  rowsFromRight: z.boolean().optional(),
  /** Name under which to keep this mapping as a recipe. */
  save: plainText(120).min(1).optional(),
});
export type LogMapping = z.infer<typeof LogMapping>;

/** A mapping as it is kept for other files. */
export const RecipeMapping = LogMapping.omit({ layer: true, save: true });

/** A mapping from outside. The error names the column and the rule: `unknown-unit` for a unit, else `mapping-invalid`. */
export function parseMapping(input: unknown): Result<LogMapping, IngestError> {
  const parsed = LogMapping.safeParse(input);
  if (parsed.success) return succeed(parsed.data);
  const issue = parsed.error.issues[0];
  const path = issue?.path ?? [];
  const entry = readEntry(input, path[1]);
  const name = typeof entry?.name === "string" ? entry.name : undefined;
  const where = name !== undefined ? `column '${name}'` : `"${path.join(".") || "mapping"}"`;
  if (path[0] === "columns" && path[2] === "unit") {
    const message = `Unknown unit "${String(entry?.unit ?? "")}" in ${where}. Use one of: ${UNIT_IDS.join(", ")}.`;
    return fail(ingestError("unknown-unit", message, { column: name }));
  }
  const rule = issue?.message ?? "not a mapping";
  return fail(
    ingestError("mapping-invalid", `The mapping cannot be used: ${where}: ${rule}. Correct it and send it again.`, {
      column: name,
    }),
  );
}

function readEntry(input: unknown, index: PropertyKey | undefined): { name?: unknown; unit?: unknown } | null {
  if (typeof input !== "object" || input === null || !("columns" in input) || !Array.isArray(input.columns))
    return null;
  const entry: unknown = typeof index === "number" ? input.columns[index] : null;
  return typeof entry === "object" && entry !== null ? entry : null;
}

/** The header names and shape of a file as one text: equal for files that one recipe fits. */
export function headerSignature(inspection: {
  format: string;
  shape: LogShape;
  columns: readonly { name: string }[];
}): string {
  return JSON.stringify([inspection.format, inspection.shape, ...inspection.columns.map((column) => column.name)]);
}

type Layered = Pick<Inspection, "format" | "shape" | "columns" | "layers">;

/** The log a mapping chooses in a file that holds several; null where it chooses none that is there. */
export function chosenLayer<T extends Pick<Layered, "shape" | "columns" | "layers">>(
  mapping: Pick<LogMapping, "layer">,
  inspection: T,
): Omit<T, "layers"> | null {
  const { layers, ...whole } = inspection;
  if (mapping.layer === undefined) return layers && layers.length > 1 ? null : whole;
  const layer = layers?.find((candidate) => candidate.id === mapping.layer);
  return layer ? { ...whole, shape: layer.shape, columns: layer.columns } : null;
}

/** A mapping as it is kept for other files: which of several logs was read belongs to the one file. */
export function toRecipe({ layer: _layer, save: _save, ...mapping }: LogMapping): LogMapping {
  return mapping;
}

/** Whether a saved mapping can read this file: same shape, every column it names is there, and no choice of logs is open. */
export function mappingFits(
  mapping: LogMapping,
  inspection: Pick<Inspection, "shape" | "columns" | "layers">,
): boolean {
  if (mapping.shape !== inspection.shape) return false;
  const names = new Set(chosenLayer(mapping, inspection)?.columns.map((column) => column.name));
  return mapping.columns.every((column) => names.has(column.name));
}
