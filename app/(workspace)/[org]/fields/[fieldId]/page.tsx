import { redirect } from "next/navigation";

interface FieldPageProps {
  params: Promise<{ org: string; fieldId: string }>;
}

/** A field's book opens at its first chapter. */
export default async function FieldPage({ params }: FieldPageProps) {
  const { org, fieldId } = await params;
  redirect(`/${org}/fields/${fieldId}/rows`);
}
