import "server-only";
import { withOrganisation } from "@/db/client";
import { recordAudit } from "@/db/queries/audit";
import { findPersonById, updatePerson } from "@/db/queries/system/people";
import { describeChanges } from "@/lib/audit/describe-changes";
import { AppError } from "@/lib/errors";
import type { MePatch } from "@/lib/schemas/me";
import type { Scope } from "@/lib/scope";
import { countAttempt, forgetAttempts } from "@/lib/server/access/limit-attempts";
import { hashPassword, isPasswordRight } from "@/lib/server/access/passwords";
import { sessionStamp } from "@/lib/server/access/secrets";
import type { Container } from "@/lib/server/container";
import type { OwnUnits } from "@/lib/units/display-unit";

/** The person's own units after a patch; those set to null are gone. */
function mergeOwnUnits(before: OwnUnits, patch: MePatch["unitPreferences"]): OwnUnits | undefined {
  if (patch === undefined) return undefined;
  const entries = Object.entries({ ...before, ...patch });
  return Object.fromEntries(entries.filter(([, unit]) => unit !== null && unit !== undefined));
}

async function newHash(userId: string, patch: MePatch): Promise<string | undefined> {
  if (patch.newPassword === undefined) return undefined;
  await countAttempt("password", userId);
  const person = await findPersonById(userId);
  if (!(await isPasswordRight(patch.currentPassword ?? "", person?.passwordHash ?? null))) {
    throw new AppError("unprocessable", "The current password is not right.", {
      detailCode: "wrong_password",
      places: [{ path: "currentPassword", message: "is not right" }],
    });
  }
  await forgetAttempts("password", userId);
  return hashPassword(patch.newPassword);
}

/**
 * Changes the person's own name, units or password. Returns the stamp that a session needs after a new password, which
 * ends all the others; null when the password stays.
 */
export async function updateMe(_container: Container, scope: Scope, patch: MePatch): Promise<{ stamp: string | null }> {
  const { name, unitSystem, contrast } = patch;
  const before = await findPersonById(scope.userId);
  const passwordHash = await newHash(scope.userId, patch);
  const unitPreferences = mergeOwnUnits(before?.unitPreferences ?? {}, patch.unitPreferences);
  const values = Object.fromEntries(
    Object.entries({ name, unitSystem, unitPreferences, contrast, passwordHash }).filter(
      ([, value]) => value !== undefined,
    ),
  );
  if (Object.keys(values).length === 0) return { stamp: null };
  await updatePerson(scope.userId, values);
  const changes = describeChanges(before ?? {}, { name, unitSystem, unitPreferences, contrast });
  const changed = passwordHash ? [...changes.changed, "password"] : changes.changed;
  const detail = { name: before?.name ?? null, ...changes, changed };
  await withOrganisation(scope, (tx) =>
    recordAudit(tx, scope, { action: "person.update", subject: scope.userId, detail }),
  );
  return { stamp: passwordHash ? sessionStamp({ passwordHash, sessionSalt: before?.sessionSalt ?? "" }) : null };
}
