"use client";

import { useState } from "react";
import { Controller, useFormContext } from "react-hook-form";
import type { DraftMachine } from "@/components/machines/toolbar-drawing";
import { TextField } from "@/components/ui/form-field";
import { parseEntry } from "@/components/units/quantity-input";

function parseCounts(text: string): number[] | undefined {
  const entries = text.split(/[;,+\s]+/).filter((entry) => entry !== "");
  return entries.length === 0 ? undefined : entries.map((entry) => parseEntry(entry) ?? NaN);
}

export interface RowCountsFieldProps {
  name: "sections" | "wings";
  label: string;
  hint: string;
}

/** How many rows each part has, left to right: "6 6 6 6". */
export function RowCountsField({ name, label, hint }: RowCountsFieldProps) {
  const { control } = useFormContext<DraftMachine>();
  const [fresh, setFresh] = useState<string | null>(null);
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <TextField
          label={label}
          hint={hint}
          inputMode="text"
          autoComplete="off"
          error={fieldState.error ? (fieldState.error.message ?? "One of these is not a whole number.") : undefined}
          value={fresh ?? (Array.isArray(field.value) ? field.value.join(" ") : "")}
          onBlur={() => {
            setFresh(null);
            field.onBlur();
          }}
          onChange={(event) => {
            setFresh(event.target.value);
            field.onChange(parseCounts(event.target.value));
          }}
        />
      )}
    />
  );
}
