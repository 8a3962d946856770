import { Readable } from "node:stream";
import type { S3Client } from "@aws-sdk/client-s3";
import { AppError } from "@/lib/errors";
import type { ObjectRange, ObjectStorage } from "@/lib/ports/object-storage";
import type { Environment } from "@/lib/server/env";

const PART_BYTES = 8 * 1024 * 1024;

type Sdk = typeof import("@aws-sdk/client-s3");

function isMissing(error: unknown): boolean {
  if (!(error instanceof Error)) return false;
  const { $metadata } = error as Error & { $metadata?: { httpStatusCode?: number } };
  return error.name === "NoSuchKey" || $metadata?.httpStatusCode === 404;
}

type S3Settings = Pick<Environment, "S3_ENDPOINT" | "S3_BUCKET" | "S3_ACCESS_KEY" | "S3_SECRET_KEY" | "S3_REGION">;

/** Any object store that speaks S3. */
export class S3Storage implements ObjectStorage {
  private readonly bucket: string;
  private opened: Promise<{ sdk: Sdk; client: S3Client }> | undefined;

  constructor(private readonly env: S3Settings) {
    this.bucket = env.S3_BUCKET;
  }

  /** The SDK takes some 40 MB of memory: it is loaded by those who use it. */
  private open(): Promise<{ sdk: Sdk; client: S3Client }> {
    return (this.opened ??= import("@aws-sdk/client-s3").then((sdk) => ({ sdk, client: this.createClient(sdk) })));
  }

  private createClient(sdk: Sdk): S3Client {
    const { env } = this;
    return new sdk.S3Client({
      endpoint: env.S3_ENDPOINT,
      region: env.S3_REGION,
      forcePathStyle: true,
      credentials: { accessKeyId: env.S3_ACCESS_KEY, secretAccessKey: env.S3_SECRET_KEY },
      // The bytes are hashed by us; not every store knows the newer trailing checksums.
      requestChecksumCalculation: "WHEN_REQUIRED",
      responseChecksumValidation: "WHEN_REQUIRED",
    });
  }

  async put(
    key: string,
    body: AsyncIterable<Uint8Array> | Uint8Array,
    options: { signal?: AbortSignal; contentType?: string } = {},
  ): Promise<{ bytes: number }> {
    let bytes = 0;
    async function* counted(): AsyncIterable<Uint8Array> {
      for await (const chunk of body instanceof Uint8Array ? [body] : body) {
        options.signal?.throwIfAborted();
        bytes += chunk.length;
        yield chunk;
      }
    }
    const { client } = await this.open();
    const { Upload } = await import("@aws-sdk/lib-storage");
    const upload = new Upload({
      client,
      params: {
        Bucket: this.bucket,
        Key: key,
        Body: Readable.from(counted(), { objectMode: false }),
        ContentType: options.contentType,
      },
      partSize: PART_BYTES,
      queueSize: 2,
    });
    const stop = () => void upload.abort();
    options.signal?.addEventListener("abort", stop, { once: true });
    try {
      await upload.done();
    } finally {
      options.signal?.removeEventListener("abort", stop);
    }
    return { bytes };
  }

  async *get(key: string, range?: ObjectRange): AsyncIterable<Uint8Array> {
    const stream = await this.openObject(key, range);
    try {
      for await (const chunk of stream) yield chunk as Uint8Array;
    } finally {
      stream.destroy();
    }
  }

  private async openObject(key: string, range?: ObjectRange): Promise<Readable> {
    const { sdk, client } = await this.open();
    try {
      const found = await client.send(
        new sdk.GetObjectCommand({
          Bucket: this.bucket,
          Key: key,
          Range: range ? `bytes=${range.start}-${range.end}` : undefined,
        }),
      );
      return found.Body as Readable;
    } catch (error) {
      if (isMissing(error)) throw new AppError("not_found", "The file is not in the store", { cause: error });
      throw new AppError("unavailable", "The file store does not answer", { cause: error });
    }
  }

  async head(key: string): Promise<{ bytes: number } | null> {
    const { sdk, client } = await this.open();
    try {
      const found = await client.send(new sdk.HeadObjectCommand({ Bucket: this.bucket, Key: key }));
      return { bytes: found.ContentLength ?? 0 };
    } catch (error) {
      if (isMissing(error)) return null;
      throw error;
    }
  }

  async copy(from: string, to: string): Promise<void> {
    const { sdk, client } = await this.open();
    const source = `${this.bucket}/${from.split("/").map(encodeURIComponent).join("/")}`;
    await client.send(new sdk.CopyObjectCommand({ Bucket: this.bucket, Key: to, CopySource: source }));
  }

  async delete(key: string): Promise<void> {
    const { sdk, client } = await this.open();
    await client.send(new sdk.DeleteObjectCommand({ Bucket: this.bucket, Key: key }));
  }

  async *list(prefix: string): AsyncIterable<{ key: string; bytes: number; modifiedAt: Date | null }> {
    const { sdk, client } = await this.open();
    let next: string | undefined;
    do {
      const page = await client.send(
        new sdk.ListObjectsV2Command({ Bucket: this.bucket, Prefix: prefix, ContinuationToken: next }),
      );
      for (const entry of page.Contents ?? []) {
        if (entry.Key) yield { key: entry.Key, bytes: entry.Size ?? 0, modifiedAt: entry.LastModified ?? null };
      }
      next = page.NextContinuationToken;
    } while (next);
  }

  async ping(): Promise<void> {
    const { sdk, client } = await this.open();
    await client.send(new sdk.HeadBucketCommand({ Bucket: this.bucket }));
  }
}
