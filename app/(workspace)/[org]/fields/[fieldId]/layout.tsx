import type { ReactNode } from "react";
import { container } from "@/app/_server/container";
import { orNotFound, requireScope } from "@/app/_server/require-scope";
import { readField } from "@/lib/server/fields/read-fields";

interface FieldLayoutProps {
  children: ReactNode;
  params: Promise<{ org: string; fieldId: string }>;
}

/** A field that is absent, or not open to this person, does not exist: the same page for both. */
export default async function FieldLayout({ children, params }: FieldLayoutProps) {
  const { org, fieldId } = await params;
  const { scope } = await requireScope(org);
  await orNotFound(readField(container(), scope, fieldId));
  return children;
}
