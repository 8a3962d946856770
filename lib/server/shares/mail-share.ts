import "server-only";
import type { Scope } from "@/lib/scope";
import { countAttempt } from "@/lib/server/access/limit-attempts";
import type { Container } from "@/lib/server/container";

interface Letter {
  to: string;
  url: string;
  fieldName: string;
  expiresAt: Date;
  hasPasscode: boolean;
}

function writeText({ fieldName, url, expiresAt, hasPasscode }: Letter): string {
  return [
    `Somebody shares the field "${fieldName}" with you in Coulterbook:`,
    "",
    url,
    "",
    `The link works until ${expiresAt.toISOString().slice(0, 10)} and needs no account.`,
    ...(hasPasscode ? ["It asks for a passcode, which whoever shared it will tell you."] : []),
    "Whoever has the link can open it: keep it to yourself.",
  ].join("\n");
}

/** Counts a mail before anything is made. @throws AppError `too_many_requests` for the person or the organisation */
export async function countMail(scope: Scope): Promise<void> {
  await countAttempt("mail-from", scope.userId);
  await countAttempt("mail", scope.organisationId);
}

/** Mails the link. False when the mail did not leave; the share itself stands, and its maker has the address. */
export async function mailShare(container: Container, letter: Letter): Promise<boolean> {
  try {
    const subject = `A field shared with you: ${letter.fieldName.replaceAll(/[\r\n]+/g, " ")}`;
    await container.mailer.send({ to: letter.to, subject, text: writeText(letter) });
    return true;
  } catch (error) {
    console.error(`a share link was not mailed: ${error instanceof Error ? error.message : String(error)}`);
    return false;
  }
}
