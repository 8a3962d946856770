"use client";

import Link from "next/link";
import { FieldsTable } from "@/components/fields/fields-table";
import { useFieldPages } from "@/components/hooks/use-fields";
import { buttonClass } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/empty-state";
import { useWithoutRemoved } from "@/components/removals/use-removals";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { can, type Role } from "@/lib/access/permissions";
import { describeFailure } from "@/lib/api/api-problem";

export function FieldsPage({ slug, role }: { slug: string; role: Role }) {
  const fields = useFieldPages();
  const items = useWithoutRemoved(fields.items);
  if (fields.isPending) return <Loading what="the fields" />;
  if (!items)
    return (
      <Notice state="act" urgent>
        {describeFailure(fields.error)}
      </Notice>
    );
  if (items.length === 0) return <NoFields slug={slug} role={role} />;
  return <FieldsTable slug={slug} fields={items} mayUpload={can(role, "logs.upload")} more={fields.more} />;
}

function NoFields({ slug, role }: { slug: string; role: Role }) {
  if (!can(role, "fields.write")) {
    return (
      <EmptyState title="No field is open to you yet">
        <p>An owner gives fields to people under People. Ask yours for the fields you work on.</p>
      </EmptyState>
    );
  }
  return (
    <EmptyState
      title="Begin with one field"
      action={
        <Link href={`/${slug}/fields/new`} className={buttonClass("primary")}>
          Make a field
        </Link>
      }
    >
      <p>
        A field is a name and, if you have it, a boundary. Each field has a book of its own: its logs and its shares.
      </p>
      <p>Then drop a row-by-row log from the drill onto it. Within a minute the book says which rows to look at.</p>
    </EmptyState>
  );
}
