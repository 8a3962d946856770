import { z } from "zod";
import { plainText } from "@/lib/schemas/plain-text";

/** Bounds no farm machine reaches: they keep a slip of the keyboard, or an ill will, from drawing rows across a continent. */
const metres = z.number().min(-100).max(100);
const reachM = z.number().positive().max(100);
const massKg = z.number().min(0).max(200_000);
const forceN = z.number().min(0).max(1_000_000);
const BallastPiece = z.object({ massKg, behindHitchM: metres });

export const Frame = z.object({
  massKg: massKg.positive(),
  behindHitchM: metres,
  wheelsBehindHitchM: reachM,
  rowsBehindHitchM: reachM,
  ballast: z.array(BallastPiece).max(100).default([]),
  minWheelLoadN: forceN,
});
export type Frame = z.infer<typeof Frame>;

const rowCounts = z.array(z.number().int().min(1).max(256)).min(1).max(256);
const name = plainText(120).min(1);

/** A drill or planter. Offsets: `antennaToRowsM` behind the antenna; right of centre positive; row 1 leftmost looking forward. */
export const SeederInput = z.object({
  kind: z.literal("seeder"),
  name,
  rowCount: z.number().int().min(1).max(256),
  rowSpacingM: z.number().positive().max(5),
  rowOffsetsM: z.array(metres).optional(),
  rowForwardM: z.array(metres).optional(),
  /** Rows switched together, left to right: their numbers. */
  sections: rowCounts.optional(),
  /** Rows on each part of the frame that rises on its own, left to right. */
  wings: rowCounts.optional(),
  antennaToRowsM: metres,
  antennaRightM: metres.default(0),
  hitch: z.enum(["rigid", "trailed"]),
  antennaToHitchM: metres.optional(),
  hitchToRowsM: reachM.optional(),
  rowUnitMassKg: massKg,
  maxDownforceN: forceN.positive().optional(),
  targetMarginN: forceN.positive().optional(),
  marginDeadbandN: forceN.optional(),
  frame: Frame.optional(),
});
export type Seeder = z.infer<typeof SeederInput>;

export const CombineInput = z.object({
  kind: z.literal("combine"),
  name,
  headerWidthM: z.number().positive().max(30),
  headerRows: z.number().int().positive().max(64).optional(),
  spreadWidthM: z.number().positive().max(60).optional(),
});
export type Combine = z.infer<typeof CombineInput>;

/** Body of `POST /machines`; lists of row offsets must have one entry a row. */
export const MachineInput = z
  .discriminatedUnion("kind", [SeederInput, CombineInput])
  .superRefine((machine, context) => {
    if (machine.kind !== "seeder") return;
    for (const key of ["rowOffsetsM", "rowForwardM"] as const) {
      const list = machine[key];
      if (list && list.length !== machine.rowCount) {
        context.addIssue({
          code: "custom",
          path: [key],
          message: `needs one entry a row: ${machine.rowCount}, got ${list.length}`,
        });
      }
    }
    for (const key of ["sections", "wings"] as const) {
      const sum = machine[key]?.reduce((rows, count) => rows + count, 0) ?? machine.rowCount;
      if (sum !== machine.rowCount) {
        context.addIssue({ code: "custom", path: [key], message: `add up to ${sum} rows, not ${machine.rowCount}` });
      }
    }
    if (machine.hitch === "trailed" && machine.hitchToRowsM === undefined) {
      context.addIssue({
        code: "custom",
        path: ["hitchToRowsM"],
        message: "a trailed machine needs the distance from hitch pin to rows",
      });
    }
  });
export type Machine = z.infer<typeof MachineInput>;
