import type { ObjectStorage } from "@/lib/ports/object-storage";

const DAY_MS = 24 * 60 * 60 * 1000;

/** Removes uploads that a dead web process left half-way, a day later. */
export async function sweepIncoming(storage: ObjectStorage, now = Date.now()): Promise<void> {
  for await (const entry of storage.list("organisations/")) {
    const isOld = entry.modifiedAt !== null && now - entry.modifiedAt.getTime() > DAY_MS;
    if (isOld && entry.key.split("/")[2] === "incoming") await storage.delete(entry.key);
  }
}
