"use client";

import { useState } from "react";
import { Controller, useFormContext } from "react-hook-form";
import type { DraftMachine } from "@/components/machines/toolbar-drawing";
import { TextArea } from "@/components/ui/form-field";
import { parseEntry } from "@/components/units/quantity-input";
import { useUnits } from "@/components/units/use-units";
import { displayUnit } from "@/lib/units/display-unit";

/** "-2875, -2625, …" in the person's units to metres; undefined when empty. */
function parseList(text: string, factor: number): number[] | undefined {
  const entries = text.split(/[;\s]+|,\s+/).filter((entry) => entry !== "");
  return entries.length === 0 ? undefined : entries.map((entry) => (parseEntry(entry) ?? NaN) * factor);
}

/** One length a row, instead of even spacing. */
export function RowListField({ name, label }: { name: "rowOffsetsM" | "rowForwardM"; label: string }) {
  const { control } = useFormContext<DraftMachine>();
  const { system } = useUnits();
  const { factor, words } = displayUnit("m", system, "rowSpacing");
  const [fresh, setFresh] = useState<string | null>(null);
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => {
        const kept = Array.isArray(field.value)
          ? field.value.map((entry) => Number((Number(entry) / factor).toPrecision(7)))
          : [];
        return (
          <TextArea
            label={label}
            hint={`In ${words}, one number a row from the left, with spaces between. Empty: evenly spaced.`}
            rows={3}
            error={fieldState.error ? (fieldState.error.message ?? "One of these is not a number.") : undefined}
            value={fresh ?? kept.join(" ")}
            onBlur={() => setFresh(null)}
            onChange={(event) => {
              setFresh(event.target.value);
              field.onChange(parseList(event.target.value, factor));
            }}
          />
        );
      }}
    />
  );
}
