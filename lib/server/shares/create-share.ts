import "server-only";
import { withOrganisation, type Transaction } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { findNewestLogOfField, insertShare, isLogOfField } from "@/db/queries/shares";
import { AppError } from "@/lib/errors";
import { newId } from "@/lib/ids";
import type { ShareCreated, ShareInput } from "@/lib/schemas/shares";
import type { Scope } from "@/lib/scope";
import { findExpiryFault } from "@/lib/sharing/share-state";
import { hashPassword } from "@/lib/server/access/passwords";
import { hashSecret, newShareToken } from "@/lib/server/access/secrets";
import type { Container } from "@/lib/server/container";
import { getFieldOrThrow } from "@/lib/server/fields/get-field-or-throw";
import { describeShare } from "@/lib/server/shares/describe-share";
import { countMail, mailShare } from "@/lib/server/shares/mail-share";

function refuse(path: string, message: string): never {
  throw new AppError("unprocessable", `${path}: ${message}.`, { places: [{ path, message }] });
}

function checkWishes(input: ShareInput, now: Date): void {
  const fault = findExpiryFault(new Date(input.expiresAt), now);
  if (fault) refuse("expiresAt", fault);
  if (input.allowDownload) refuse("allowDownload", "downloads through a share are not built yet; leave it false");
}

/** Fixed when the share is made: a log that arrives later, a harvest perhaps, never shows through an old link. */
async function chooseLog(tx: Transaction, scope: Scope, input: { fieldId: string; logId: string | undefined }) {
  const { fieldId, logId } = input;
  if (logId === undefined) return findNewestLogOfField(tx, scope, fieldId);
  if (!(await isLogOfField(tx, scope, { logId, fieldId }))) refuse("logId", "is no log of this field");
  return logId;
}

/** Makes a share of one field. The address is in this reply and nowhere else: only its hash is kept. */
export async function createShare(
  container: Container,
  scope: Scope,
  request: { fieldId: string; input: ShareInput },
): Promise<ShareCreated> {
  const { fieldId, input } = request;
  const now = container.clock.now();
  checkWishes(input, now);
  if (input.emailTo) await countMail(scope);
  const token = newShareToken();
  const passcodeHash = input.passcode ? await hashPassword(input.passcode) : null;
  const { row, fieldName } = await withOrganisation(scope, async (tx) => {
    const { name } = await getFieldOrThrow(tx, scope, fieldId);
    const logId = await chooseLog(tx, scope, { fieldId, logId: input.logId });
    const { audience, allowDownload, blurLocation } = input;
    const layers = [...new Set(input.layers)];
    const expiresAt = new Date(input.expiresAt);
    const hashes = { tokenHash: hashSecret(token), passcodeHash };
    const values = { fieldId, logId, audience, layers, allowDownload, blurLocation, expiresAt, ...hashes };
    const made = await insertShare(tx, scope, { ...values, id: newId("share"), createdAt: now });
    const detail = {
      name,
      fieldId,
      logId,
      audience,
      layers,
      expiresAt: input.expiresAt,
      hasPasscode: passcodeHash !== null,
    };
    await recordAudit(tx, scope, { action: "share.create", subject: made.id, detail });
    return { row: made, fieldName: name };
  });
  const url = `${container.env.baseUrl}/s/${token}`;
  const letter = { url, fieldName, expiresAt: row.expiresAt, hasPasscode: passcodeHash !== null };
  const emailed = input.emailTo ? await mailShare(container, { to: input.emailTo, ...letter }) : null;
  return { ...describeShare(row, now), url, emailed };
}
