import type { ReactNode } from "react";
import { notFound } from "next/navigation";
import { container } from "@/app/_server/container";
import { requireScope } from "@/app/_server/require-scope";
import { AppError } from "@/lib/errors";
import { readField } from "@/lib/server/fields/read-fields";

interface FieldLayoutProps {
  children: ReactNode;
  params: Promise<{ org: string; fieldId: string }>;
}

/** A field that is absent, or not open to this person, does not exist: the same page for both. */
export default async function FieldLayout({ children, params }: FieldLayoutProps) {
  const { org, fieldId } = await params;
  const { scope } = await requireScope(org);
  try {
    await readField(container(), scope, fieldId);
  } catch (error) {
    if (error instanceof AppError && error.code === "not_found") notFound();
    throw error;
  }
  return children;
}
