"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useState, type ReactNode } from "react";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { BoundaryField, type BoundaryFieldProps } from "@/components/fields/boundary-field";
import type { BoundaryChange } from "@/components/hooks/use-fields";
import { Button } from "@/components/ui/button";
import { TextField } from "@/components/ui/form-field";
import { Notice } from "@/components/ui/notice";
import { ApiProblem, describeFailure } from "@/lib/api/api-problem";

const FormShape = z.object({
  name: z.string().trim().min(1, "A field needs a name.").max(120, "At most 120 characters."),
  farm: z.string().trim().max(120, "At most 120 characters."),
  landowner: z.string().trim().max(120, "At most 120 characters."),
});
type FormValues = z.infer<typeof FormShape>;

export interface FieldFormValues {
  name: string;
  farm: string | null;
  landowner: string | null;
}

export interface FieldFormProps {
  start: FieldFormValues;
  saveWords: string;
  pending: boolean;
  failure: unknown;
  onSave: (values: FieldFormValues, boundary: BoundaryChange) => void;
  /** Where the boundary can be drawn. */
  drawing?: BoundaryFieldProps["drawing"];
  /** Further buttons beside the save button. */
  children?: ReactNode;
}

/** Name, farm, landowner and boundary of a field, new or known. */
export function FieldForm({ start, saveWords, pending, failure, onSave, children, drawing }: FieldFormProps) {
  const [boundary, setBoundary] = useState<BoundaryChange>({ kind: "none" });
  const [isBoundaryWrong, setBoundaryWrong] = useState(false);
  // Words about an answer that has been given anew since are gone.
  const [settled, setSettled] = useState<unknown>(null);
  const standing = failure === settled ? null : failure;
  const form = useForm<FormValues>({
    resolver: zodResolver(FormShape),
    defaultValues: { name: start.name, farm: start.farm ?? "", landowner: start.landowner ?? "" },
  });
  const { errors } = form.formState;
  const refused = standing instanceof ApiProblem ? standing : null;
  const submit = form.handleSubmit((values) =>
    onSave({ name: values.name, farm: values.farm || null, landowner: values.landowner || null }, boundary),
  );
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="max-w-xl space-y-5">
      <TextField
        label="Name"
        hint="As people on the farm call it, such as East quarter."
        error={errors.name?.message ?? refused?.messageFor("name")}
        {...form.register("name")}
      />
      <div className="grid gap-5 md:grid-cols-2">
        <TextField
          label="Farm"
          error={errors.farm?.message ?? refused?.messageFor("farm")}
          {...form.register("farm")}
        />
        <TextField
          label="Landowner"
          hint="If the land is rented; shown when sharing."
          error={errors.landowner?.message ?? refused?.messageFor("landowner")}
          {...form.register("landowner")}
        />
      </div>
      <BoundaryField
        onChange={(change, isWrong) => {
          setBoundary(change);
          setBoundaryWrong(isWrong);
          setSettled(failure);
        }}
        error={refused?.messageFor("boundary")}
        drawing={drawing}
      />
      {standing ? (
        <Notice state="act" urgent title="Not saved">
          {describeFailure(standing)}
        </Notice>
      ) : null}
      <div className="flex flex-wrap gap-2">
        <Button type="submit" kind="primary" disabled={pending || isBoundaryWrong}>
          {pending ? "Saving…" : saveWords}
        </Button>
        {children}
      </div>
    </form>
  );
}
