"use client";

import { Controller, useFormContext } from "react-hook-form";
import type { QuantityQuestion } from "@/components/machines/machine-form-fields";
import type { DraftMachine } from "@/components/machines/toolbar-drawing";
import { QuantityInput } from "@/components/units/quantity-input";

/** One number of a machine, bound to the form around it. */
export function Question({ question }: { question: QuantityQuestion }) {
  const { control } = useFormContext<DraftMachine>();
  return (
    <Controller
      control={control}
      name={question.key}
      render={({ field, fieldState }) => (
        <QuantityInput
          label={question.label}
          hint={question.hint}
          unit={question.unit}
          channel={question.ruler ? "rowSpacing" : undefined}
          error={fieldState.error?.message}
          value={typeof field.value === "number" ? field.value : undefined}
          onChange={field.onChange}
          onBlur={field.onBlur}
        />
      )}
    />
  );
}

export function QuestionGrid({ questions }: { questions: QuantityQuestion[] }) {
  return (
    <div className="grid gap-5 sm:grid-cols-2">
      {questions.map((question) => (
        <Question key={question.key} question={question} />
      ))}
    </div>
  );
}
