import "server-only";
import { findShareByTokenHash, recordShareOpening, type ShareRow } from "@/db/queries/system/shares";
import { AppError } from "@/lib/errors";
import type { Scope } from "@/lib/scope";
import { shareState } from "@/lib/sharing/share-state";
import { countAttempt, refuseWhenLimited } from "@/lib/server/access/limit-attempts";
import { isPasswordRight } from "@/lib/server/access/passwords";
import { openText, sealText } from "@/lib/server/access/seal-text";
import { hashSecret } from "@/lib/server/access/secrets";
import type { Container } from "@/lib/server/container";

export interface ShareKey {
  token: string;
  /** As typed; checked slowly, so give it once and keep the pass. */
  passcode?: string;
  /** What `issuePass` gave after a right passcode. */
  pass?: string;
  /** Sender's address, for counting guesses. */
  from: string;
}

export interface OpenedShare {
  share: ShareRow;
  /** Acts for whoever made the share, inside its organisation; what is shown is cut down to the shared layers. */
  scope: Scope;
}

/** Proof of a right passcode, void once the share has another; kept by the visitor as a cookie. */
export function issuePass(container: Container, share: ShareRow): string {
  return sealText(share.id, container.env.AUTH_SECRET, share.passcodeHash ?? "");
}

function isPassRight(container: Container, share: ShareRow, pass: string | undefined): boolean {
  if (!pass) return false;
  try {
    return openText(pass, container.env.AUTH_SECRET, share.passcodeHash ?? "") === share.id;
  } catch {
    return false;
  }
}

async function checkPasscode(container: Container, share: ShareRow, key: ShareKey): Promise<void> {
  if (share.passcodeHash === null || isPassRight(container, share, key.pass)) return;
  if (key.passcode === undefined) {
    throw new AppError("unauthorized", "This link asks for a passcode.", { detailCode: "passcode_required" });
  }
  await refuseWhenLimited("passcode", share.id);
  if (await isPasswordRight(key.passcode, share.passcodeHash)) return;
  await countAttempt("passcode", share.id);
  throw new AppError("unauthorized", "That passcode is not right.", { detailCode: "wrong_passcode" });
}

/**
 * Opens a share by the token in its address.
 * @throws AppError 404 unknown, 410 expired or revoked, 401 passcode missing or wrong, 429 after too many guesses
 */
export async function openShare(container: Container, key: ShareKey): Promise<OpenedShare> {
  const share = await findShareByTokenHash(hashSecret(key.token));
  if (!share) {
    await countAttempt("share", key.from);
    throw new AppError("not_found", "There is no such share.");
  }
  const state = shareState(share, container.clock.now());
  if (state !== "open") {
    const why = state === "expired" ? "This link has expired." : "This link was withdrawn.";
    throw new AppError("gone", why, { detailCode: `share_${state}` });
  }
  await checkPasscode(container, share, key);
  const scope: Scope = { organisationId: share.organisationId, userId: share.createdBy ?? "share", role: "agronomist" };
  return { share, scope };
}

/** Counts one opening of the page. */
export async function countOpening(container: Container, share: ShareRow): Promise<void> {
  await recordShareOpening(share, container.clock.now());
}
