import { z } from "zod";
import { PassReadings } from "@/lib/schemas/logs";

/** Readings of a pass whose values may come as one text: a fifth of the work of lists at both ends. */
export const PackablePassReadings = PassReadings.extend({
  /** Base64 of little-endian Float32, record by record, row 1 first, NaN where nothing was logged. `values` is empty then. */
  packedValues: z.string().optional(),
});
export type PackablePassReadings = z.infer<typeof PackablePassReadings>;
