import { z } from "zod";
import type { SiUnit } from "@/lib/logs/machine-log";
import type { PackedPlacedLog } from "@/lib/logs/packed-placed-log";
import { SeederInput } from "@/lib/machines/machine";

const numbers = z.array(z.number());

/** All of a placed log but its arrays over records: what is stored beside the packed readings. */
export const PlacedBody = z.object({
  kind: z.enum(["seeding", "harvest", "other"]),
  records: z.number().int(),
  rows: z.number().int(),
  timeIsRelative: z.boolean(),
  machine: SeederInput.nullable(),
  planeCentre: z.object({ longitude: z.number(), latitude: z.number() }),
  geometry: z.object({ rows: z.number().int(), offsetM: numbers, forwardM: numbers, widthM: numbers }),
  passes: z.array(
    z.object({
      pass: z.number().int(),
      first: z.number().int(),
      records: z.number().int(),
      // Null stands for NaN, which JSON does not have.
      startedAtMs: z.number().nullable(),
      endedAtMs: z.number().nullable(),
      headingDeg: z.number().nullable(),
      lengthM: z.number(),
      headland: z.boolean(),
    }),
  ),
  channels: z.array(
    z.object({
      id: z.string(),
      unit: z.custom<SiUnit>((unit) => typeof unit === "string"),
      rows: z.number().int(),
      perRow: z.boolean(),
      resolution: z.number().nullable(),
    }),
  ),
});
export type PlacedBody = z.infer<typeof PlacedBody>;

const orNull = (value: number) => (Number.isFinite(value) ? value : null);

export function toPlacedBody(placed: PackedPlacedLog): PlacedBody {
  const { log, geometry } = placed;
  return {
    kind: log.kind,
    records: log.records,
    rows: log.rows,
    timeIsRelative: log.timeIsRelative,
    machine: placed.machine,
    planeCentre: placed.planeCentre,
    geometry: {
      rows: geometry.rows,
      offsetM: [...geometry.offsetM],
      forwardM: [...geometry.forwardM],
      widthM: [...geometry.widthM],
    },
    passes: placed.passes.map((pass) => ({
      ...pass,
      startedAtMs: orNull(pass.startedAtMs),
      endedAtMs: orNull(pass.endedAtMs),
      headingDeg: orNull(pass.headingDeg),
    })),
    channels: log.channels.map(({ id, unit, rows, perRow, resolution }) => ({ id, unit, rows, perRow, resolution })),
  };
}
