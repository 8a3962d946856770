import { sql } from "drizzle-orm";
import { appDb } from "@/db/client";

/** Whether the application's own role gets an answer. @throws when it does not */
export async function pingDatabase(): Promise<void> {
  await appDb().execute(sql`select 1`);
}
