import { openSharedPage, sharedTokenOfRequest } from "@/app/_server/share-pass";
import { ClosedShare } from "@/components/sharing/closed-share";

/** Why the link opens nothing. Next makes this beside every page of the link: where it opens, there is nothing to say. */
export default async function ClosedSharePage() {
  const { state } = await openSharedPage(await sharedTokenOfRequest());
  return state === "open" || state === "passcode" ? null : <ClosedShare state={state} />;
}
