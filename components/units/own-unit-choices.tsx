"use client";

import { SelectField } from "@/components/ui/form-field";
import { useUnits } from "@/components/units/use-units";
import { displayUnit, OWN_UNITS, type OwnUnitKind } from "@/lib/units/display-unit";

const KINDS: readonly { kind: OwnUnitKind; label: string; siUnit: string; channel?: string }[] = [
  { kind: "force", label: "Forces", siUnit: "N" },
  { kind: "depth", label: "Depth and row spacing", siUnit: "m", channel: "depth" },
  { kind: "area", label: "Areas", siUnit: "m2" },
  { kind: "speed", label: "Speeds", siUnit: "m/s" },
];

/** Units taken one by one over those of the system: forces in newtons beside depths in inches, for one. */
export function OwnUnitChoices() {
  const { systemName, own, setOwn } = useUnits();
  return (
    <fieldset className="space-y-2">
      <legend className="font-semibold">Mixed units</legend>
      <p className="text-table text-ink-soft">A unit chosen here is shown whichever of the two is on above.</p>
      <div className="grid max-w-xl gap-x-4 gap-y-3 sm:grid-cols-2">
        {KINDS.map(({ kind, label, siUnit, channel }) => (
          <SelectField
            key={kind}
            label={label}
            value={own[kind] ?? ""}
            onChange={(event) => {
              setOwn({ ...own, [kind]: event.target.value || undefined });
            }}
          >
            <option value="">As above ({displayUnit(siUnit, systemName, channel).symbol})</option>
            {OWN_UNITS[kind].map((unit) => (
              <option key={unit} value={unit}>
                {unit}
              </option>
            ))}
          </SelectField>
        ))}
      </div>
    </fieldset>
  );
}
