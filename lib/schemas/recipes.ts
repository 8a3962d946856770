import { z } from "zod";
import { LOG_FORMAT_IDS } from "@/lib/ingest/log-format";
import { LOG_SHAPES, RecipeMapping } from "@/lib/ingest/mapping";
import { MachineInput } from "@/lib/machines/machine";
import { Id, Instant, listOf } from "@/lib/schemas/listing";
import { plainText } from "@/lib/schemas/plain-text";

const RecipeName = plainText(120).min(1);
const RecipeNote = plainText(500);
const FileFormat = z.enum(LOG_FORMAT_IDS);
const ColumnNames = z.array(z.string().min(1).max(500)).min(1).max(20_000);
/** As the database counts. */
const MOST = 2_147_483_647;
const VersionNumber = z.number().int().min(1).max(MOST);

/** A person of the organisation; the name is null once they left it. */
const Author = z.object({ id: Id, name: z.string().nullable() });

/** One version: what a person said at that time. Never changed afterwards. */
export const RecipeVersion = z.object({
  version: VersionNumber,
  /** Kind of file it reads. */
  format: FileFormat,
  shape: z.enum(LOG_SHAPES),
  /** The header that a file must have to be read with it, in order. */
  columnNames: z.array(z.string()),
  /** Columns with channel, row and unit; system of coordinates, time zone, how contact is defined. */
  mapping: RecipeMapping,
  /** The machine as it was when the recipe was saved. */
  machine: MachineInput.nullable(),
  note: z.string().nullable(),
  createdAt: Instant,
  createdBy: Author.nullable(),
});
export type RecipeVersion = z.infer<typeof RecipeVersion>;

/** A saved meaning of columns, with its newest version. A file whose header one of its versions knows is read with that. */
export const Recipe = RecipeVersion.extend({
  id: Id,
  name: z.string(),
  usedAt: Instant.nullable(),
  /** Logs of the organisation that were read with it. */
  logCount: z.number().int(),
  /** Set once deleted: offered to no file, and restorable. */
  deletedAt: Instant.nullable(),
});
export type Recipe = z.infer<typeof Recipe>;
export const RecipeList = listOf(Recipe);

/** One recipe with all of its versions, the newest first. */
export const RecipeDetail = Recipe.extend({ versions: z.array(RecipeVersion) });
export type RecipeDetail = z.infer<typeof RecipeDetail>;

export const RecipeListQuery = z.object({
  /** `1`: those deleted, instead of those in force. */
  deleted: z
    .enum(["0", "1"])
    .default("0")
    .transform((text) => text === "1"),
});
export type RecipeListQuery = z.infer<typeof RecipeListQuery>;

export const RecipeVersionQuery = z.object({ version: z.coerce.number().int().min(1).max(MOST).optional() });

/** Body of `POST /recipes`; a name that is there already gains a version. */
export const RecipeInput = z.object({
  name: RecipeName,
  format: FileFormat.default("csv"),
  /** The file's whole header in order; those that `mapping` names when left out. */
  columnNames: ColumnNames.optional(),
  mapping: RecipeMapping,
  machine: MachineInput.nullable().default(null),
  note: RecipeNote.nullable().default(null),
});
export type RecipeInput = z.infer<typeof RecipeInput>;

/** Another name, or the meaning of an earlier version again as the newest one. */
export const RecipePatch = z
  .strictObject({ name: RecipeName.optional(), useVersion: VersionNumber.optional(), note: RecipeNote.optional() })
  .refine(
    (patch) => patch.name !== undefined || patch.useVersion !== undefined,
    "give a name or a version to use again",
  );
export type RecipePatch = z.infer<typeof RecipePatch>;

export const RECIPE_SCHEMA_VERSION = 1;

/** A recipe as a file that travels: `GET /recipes/{id}/export` and `POST /recipes/import`. */
export const RecipeFile = z.strictObject({
  kind: z.literal("coulterbook-recipe"),
  schemaVersion: z.literal(RECIPE_SCHEMA_VERSION, {
    error: `this program reads recipe files of schemaVersion ${RECIPE_SCHEMA_VERSION}`,
  }),
  name: RecipeName,
  /** The version it had where it was exported; importing counts anew. */
  version: VersionNumber,
  format: FileFormat,
  columnNames: ColumnNames,
  mapping: RecipeMapping,
  machine: MachineInput.nullable(),
  note: RecipeNote.nullable(),
  exportedAt: Instant,
});
export type RecipeFile = z.infer<typeof RecipeFile>;
