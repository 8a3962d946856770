"use client";

import { Controller, useFormContext } from "react-hook-form";
import type { DraftMachine } from "@/components/machines/toolbar-drawing";
import { TextField } from "@/components/ui/form-field";
import { parseEntry } from "@/components/units/quantity-input";

export interface WholeNumberProps {
  name: string;
  label: string;
  hint?: string;
}

/** A count: rows of a drill, of a header. */
export function WholeNumber({ name, label, hint }: WholeNumberProps) {
  const { control } = useFormContext<DraftMachine>();
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <TextField
          label={label}
          hint={hint}
          inputMode="numeric"
          autoComplete="off"
          error={fieldState.error?.message}
          defaultValue={typeof field.value === "number" ? String(field.value) : ""}
          onBlur={field.onBlur}
          onChange={(event) => field.onChange(parseEntry(event.target.value))}
        />
      )}
    />
  );
}
