import { adminDb } from "@/db/client";

/** The pool that counts attempts: they happen before anyone is known, so no organisation's policy applies. */
export function attemptsPool() {
  return adminDb().$client;
}
