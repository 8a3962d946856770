import type { ObjectStorage } from "@/lib/ports/object-storage";
import { FolderStorage } from "@/lib/server/adapters/storage/folder-storage";
import { S3Storage } from "@/lib/server/adapters/storage/s3-storage";
import type { Environment } from "@/lib/server/env";

/** What an environment says about where files are kept; small enough to hand to a thread. */
export type StorageSettings = Pick<
  Environment,
  "FILES_DIR" | "S3_ENDPOINT" | "S3_BUCKET" | "S3_ACCESS_KEY" | "S3_SECRET_KEY" | "S3_REGION"
>;

export function storageSettings(env: Environment): StorageSettings {
  const { FILES_DIR, S3_ENDPOINT, S3_BUCKET, S3_ACCESS_KEY, S3_SECRET_KEY, S3_REGION } = env;
  return { FILES_DIR, S3_ENDPOINT, S3_BUCKET, S3_ACCESS_KEY, S3_SECRET_KEY, S3_REGION };
}

/** The object store that is named, or the folder where none is. */
export function openStorage(settings: StorageSettings): ObjectStorage {
  return settings.S3_ENDPOINT ? new S3Storage(settings) : new FolderStorage(settings.FILES_DIR);
}
