import { adminDb } from "@/db/client";

/** Any number, the same for all: the first half of the keys of these locks. */
const LOCK_SPACE = 7_219_045;

/**
 * Takes a log for one worker, or null when another has it. The lock belongs to a connection, so PostgreSQL gives it back
 * the moment a worker dies, however it dies.
 */
export async function lockLog(logId: string): Promise<{ release(): Promise<void> } | null> {
  const client = await adminDb().$client.connect();
  try {
    const { rows } = await client.query<{ taken: boolean }>("select pg_try_advisory_lock($1, hashtext($2)) as taken", [
      LOCK_SPACE,
      logId,
    ]);
    if (!rows[0]?.taken) {
      client.release();
      return null;
    }
  } catch (error) {
    client.release(true);
    throw error;
  }
  return {
    release: async () => {
      try {
        await client.query("select pg_advisory_unlock($1, hashtext($2))", [LOCK_SPACE, logId]);
        client.release();
      } catch {
        client.release(true);
      }
    },
  };
}
