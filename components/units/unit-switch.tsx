"use client";

import { ToggleGroup } from "radix-ui";
import { useUnits, type UnitSystemName } from "@/components/units/use-units";

const ITEM =
  "min-h-11 px-3 text-table text-ink-soft data-[state=on]:bg-sheet data-[state=on]:font-semibold data-[state=on]:text-ink md:min-h-8";

/** Metric or US units, for every number on every screen; kept with the person. */
export function UnitSwitch() {
  const { systemName, setSystem } = useUnits();
  return (
    <ToggleGroup.Root
      type="single"
      aria-label="Units"
      value={systemName}
      onValueChange={(value) => {
        if (value) setSystem(value as UnitSystemName);
      }}
      className="inline-flex divide-x divide-rule rounded border border-rule"
    >
      <ToggleGroup.Item value="metric" className={ITEM}>
        Metric
      </ToggleGroup.Item>
      <ToggleGroup.Item value="imperial" className={ITEM}>
        US
      </ToggleGroup.Item>
    </ToggleGroup.Root>
  );
}
