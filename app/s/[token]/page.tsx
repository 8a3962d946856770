import type { Metadata } from "next";
import { openSharedPage } from "@/app/_server/share-pass";
import { ClosedShare } from "@/components/sharing/closed-share";
import { PasscodeForm } from "@/components/sharing/passcode-form";
import { SharedView } from "@/components/sharing/shared-view";
import { UnitsProvider } from "@/components/units/use-units";

export const metadata: Metadata = {
  title: "A field shared with you",
  referrer: "no-referrer",
  robots: { index: false, follow: false },
};

export default async function SharedRoute({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const page = await openSharedPage(token);
  if (page.state === "open") {
    return (
      <UnitsProvider start="imperial" keep={false}>
        <SharedView view={page.view} token={token} />
      </UnitsProvider>
    );
  }
  return (
    <ClosedShare state={page.state}>{page.state === "passcode" ? <PasscodeForm token={token} /> : null}</ClosedShare>
  );
}
