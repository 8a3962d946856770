import { MachineInput, type Seeder } from "@/lib/machines/machine";
import { displayUnit, type UnitSystem } from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

/** Narrower rows and wider implements are taken for a slip of the unit. Common practice, no source. */
export const NARROWEST_ROW_M = 0.05;
export const WIDEST_IMPLEMENT_M = 60;

/** What makes a seeder's rows hard to believe, in the person's units; null where nothing does. */
function doubtRows({ rowCount, rowSpacingM }: Seeder, system: UnitSystem): string | null {
  const spacing = formatQuantity(rowSpacingM, "m", system, { channel: "rowSpacing" }).text;
  const unit = displayUnit("m", system, "rowSpacing");
  if (rowSpacingM < NARROWEST_ROW_M) {
    // 0.75 typed where millimetres are asked for was meant in metres.
    const meant = rowSpacingM / unit.factor;
    const guess = unit.symbol === "mm" && meant >= NARROWEST_ROW_M ? ` Did you mean ${Math.round(meant * 1000)}?` : "";
    return `Rows ${spacing} apart are closer than any seeder’s. This is asked in ${unit.words}.${guess}`;
  }
  const widthM = rowCount * rowSpacingM;
  if (widthM <= WIDEST_IMPLEMENT_M) return null;
  const width = formatQuantity(widthM, "m", system, { channel: "distance" }).text;
  return `${rowCount} rows ${spacing} apart are ${width} wide, wider than any seeder. Check the rows and the unit, ${unit.words}.`;
}

/** What the form takes: a whole machine whose numbers can be true. */
export function sensibleMachine(system: UnitSystem): typeof MachineInput {
  return MachineInput.superRefine((machine, context) => {
    const doubt = machine.kind === "seeder" ? doubtRows(machine, system) : null;
    if (doubt) context.addIssue({ code: "custom", path: ["rowSpacingM"], message: doubt });
  });
}
