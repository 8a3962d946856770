import type { Metadata } from "next";
import { notFound, unauthorized } from "next/navigation";
import { openSharedPage } from "@/app/_server/share-pass";
import { SharedView } from "@/components/sharing/shared-view";
import { UnitsProvider } from "@/components/units/use-units";

export const metadata: Metadata = {
  title: "A field shared with you",
  referrer: "no-referrer",
  robots: { index: false, follow: false },
};

/** The shared field; 401 with the question for the passcode, 404 with the reason for a link that opens nothing. */
export default async function SharedRoute({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const page = await openSharedPage(token);
  if (page.state === "passcode") unauthorized();
  if (page.state !== "open") notFound();
  return (
    <UnitsProvider start="imperial" keep={false}>
      <SharedView view={page.view} token={token} />
    </UnitsProvider>
  );
}
