"use client";

import { useRouter } from "next/navigation";
import { FieldForm } from "@/components/fields/field-form";
import { useCreateField } from "@/components/hooks/use-fields";
import type { BasemapConfig } from "@/components/map/basemap-config";
import { buttonClass } from "@/components/ui/button";
import Link from "next/link";

export function NewField({ slug, basemap }: { slug: string; basemap: BasemapConfig }) {
  const router = useRouter();
  const create = useCreateField();
  return (
    <FieldForm
      start={{ name: "", farm: null, landowner: null }}
      drawing={{ basemap, start: null }}
      saveWords="Make the field"
      pending={create.isPending || create.isSuccess}
      failure={create.error}
      onSave={(input, boundary) =>
        create.mutate({ input, boundary }, { onSuccess: (field) => router.push(`/${slug}/fields/${field.id}/logs`) })
      }
    >
      <Link href={`/${slug}/fields`} className={buttonClass("quiet")}>
        Back to fields
      </Link>
    </FieldForm>
  );
}
