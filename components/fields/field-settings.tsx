"use client";

import { useRouter } from "next/navigation";
import { BoundarySketch } from "@/components/fields/boundary-sketch";
import { FieldForm } from "@/components/fields/field-form";
import { useChangeField, useDeleteField, useField } from "@/components/hooks/use-fields";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { Button } from "@/components/ui/button";
import { ConfirmDialog } from "@/components/ui/dialog";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { Quantity } from "@/components/units/quantity";
import { describeFailure } from "@/lib/api/api-problem";

export interface FieldSettingsProps {
  slug: string;
  fieldId: string;
  basemap: BasemapConfig;
}

/** Name, farm, landowner and boundary of the open field; and taking it away. */
export function FieldSettings({ slug, fieldId, basemap }: FieldSettingsProps) {
  const router = useRouter();
  const field = useField(fieldId);
  const change = useChangeField(fieldId);
  const remove = useDeleteField();
  if (field.isPending) return <Loading what="the field" />;
  if (field.isError) return <Notice state="act">{describeFailure(field.error)}</Notice>;
  const { name, farm, landowner, boundary, areaM2, logCount } = field.data;
  return (
    <div className="grid gap-8 lg:grid-cols-[1fr_16rem]">
      <div className="space-y-4">
        <FieldForm
          key={field.data.updatedAt}
          start={{ name, farm, landowner }}
          drawing={{ basemap, start: boundary, fieldId }}
          saveWords="Save changes"
          pending={change.isPending}
          failure={change.error}
          onSave={(patch, next) => change.mutate({ patch, boundary: next })}
        />
        <p role="status" className="text-ink-soft">
          {change.isSuccess ? "Saved." : ""}
        </p>
      </div>
      <aside className="space-y-4">
        <div className="sheet p-4">
          <BoundarySketch boundary={boundary} className="mx-auto h-40 w-40" label={`Outline of ${name}`} />
          <p className="mt-2 text-center text-ink-soft">
            {areaM2 === null ? "No boundary yet" : <Quantity value={areaM2} unit="m2" />}
          </p>
        </div>
        <ConfirmDialog
          trigger={<Button kind="careful">Delete this field</Button>}
          title={`Delete ${name}?`}
          confirmWords="Delete field and logs"
          onConfirm={() => {
            remove({ id: fieldId, name });
            router.push(`/${slug}/fields`);
          }}
        >
          <p>
            The field, its boundary, its shares and its {logCount} {logCount === 1 ? "log" : "logs"} go. You can undo it
            for half a minute, then not any more.
          </p>
        </ConfirmDialog>
      </aside>
    </div>
  );
}
