"use client";

import { SelectField } from "@/components/ui/form-field";
import type { MachineReply } from "@/lib/schemas/machines";

export interface MachineChoiceProps {
  machines: MachineReply[];
  value: string;
  onChange: (machineId: string) => void;
}

const KIND_WORDS: Record<MachineReply["kind"], string> = { seeder: "Drills and planters", combine: "Combines" };

/** The machine that made a log, or "say later". */
export function MachineChoice({ machines, value, onChange }: MachineChoiceProps) {
  return (
    <SelectField
      label="Machine that made the log"
      hint="Its rows and antenna place every reading on the ground. Can be set later."
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
                {machine.name}
              </option>
            ))}
          </optgroup>
        );
      })}
    </SelectField>
  );
}
