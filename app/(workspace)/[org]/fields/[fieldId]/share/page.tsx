import type { Metadata } from "next";
import { requireScope } from "@/app/_server/require-scope";
import { ShareChapter } from "@/components/sharing/share-chapter";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";

export const metadata: Metadata = { title: "Share" };

export default async function ShareRoute({ params }: { params: Promise<{ org: string; fieldId: string }> }) {
  const { org, fieldId } = await params;
  await requireScope(org, "shares.read");
  return (
    <PageBody>
      <PageHeading title="Share" lead="One page for somebody without an account." />
      <ShareChapter fieldId={fieldId} />
    </PageBody>
  );
}
