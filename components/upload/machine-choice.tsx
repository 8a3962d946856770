"use client";

import { SelectField } from "@/components/ui/form-field";
import { useUnits, type Units } from "@/components/units/use-units";
import type { MachineReply } from "@/lib/schemas/machines";

export interface MachineChoiceProps {
  machines: MachineReply[];
  value: string;
  onChange: (machineId: string) => void;
  /** The machine of the field's last seeding log, where there is one. */
  lastMachineId?: string | null;
}

const KIND_WORDS: Record<MachineReply["kind"], string> = { seeder: "Drills and planters", combine: "Combines" };

const WITHOUT =
  "Without a machine, where each row ran is a guess from the tracks, and how much weight is left is not known. Can be set later.";

/** What tells two machines of nearly one name apart: "9.1 m wide, 12 rows, ballast 600 kg". */
export function describeMachine(machine: MachineReply, { format }: Pick<Units, "format">): string {
  if (machine.kind === "combine") return `${format(machine.headerWidthM, "m")} wide`;
  const parts = [`${format(machine.rowCount * machine.rowSpacingM, "m")} wide`, `${machine.rowCount} rows`];
  if (!machine.frame) return [...parts, "weights not given"].join(", ");
  const ballastKg = machine.frame.ballast.reduce((sum, piece) => sum + piece.massKg, 0);
  return [...parts, ballastKg > 0 ? `ballast ${format(ballastKg, "kg")}` : "no ballast"].join(", ");
}

function hintOf({ value, lastMachineId }: MachineChoiceProps): string {
  if (value === "") return WITHOUT;
  const place = "Its rows and antenna place every reading on the ground. Can be changed later.";
  return value === lastMachineId ? `As last time in this field. ${place}` : place;
}

/** The machine that made a log, or "say later". */
export function MachineChoice(props: MachineChoiceProps) {
  const { machines, value, onChange } = props;
  const units = useUnits();
  return (
    <SelectField
      label="Machine that made the log"
      hint={hintOf(props)}
      value={value}
      onChange={(event) => onChange(event.target.value)}
    >
      <option value="">Say later</option>
      {(["seeder", "combine"] as const).map((kind) => {
        const ofKind = machines.filter((machine) => machine.kind === kind);
        return ofKind.length === 0 ? null : (
          <optgroup key={kind} label={KIND_WORDS[kind]}>
            {ofKind.map((machine) => (
              <option key={machine.id} value={machine.id}>
                {`${machine.name} (${describeMachine(machine, units)})`}
              </option>
            ))}
          </optgroup>
        );
      })}
    </SelectField>
  );
}
