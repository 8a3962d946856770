import { sharedTokenOfRequest } from "@/app/_server/share-pass";
import { ClosedShare } from "@/components/sharing/closed-share";
import { PasscodeForm } from "@/components/sharing/passcode-form";

export default async function PasscodePage() {
  return (
    <ClosedShare state="passcode">
      <PasscodeForm token={await sharedTokenOfRequest()} />
    </ClosedShare>
  );
}
