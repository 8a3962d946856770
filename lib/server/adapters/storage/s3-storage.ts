import { Readable } from "node:stream";
import {
  CopyObjectCommand,
  DeleteObjectCommand,
  GetObjectCommand,
  HeadBucketCommand,
  HeadObjectCommand,
  ListObjectsV2Command,
  S3Client,
  S3ServiceException,
} from "@aws-sdk/client-s3";
import { Upload } from "@aws-sdk/lib-storage";
import { AppError } from "@/lib/errors";
import type { ObjectRange, ObjectStorage } from "@/lib/ports/object-storage";
import type { Environment } from "@/lib/server/env";

const PART_BYTES = 8 * 1024 * 1024;

function isMissing(error: unknown): boolean {
  return error instanceof S3ServiceException && (error.name === "NoSuchKey" || error.$metadata.httpStatusCode === 404);
}

/** Any object store that speaks S3. */
export class S3Storage implements ObjectStorage {
  private readonly client: S3Client;
  private readonly bucket: string;

  constructor(env: Pick<Environment, "S3_ENDPOINT" | "S3_BUCKET" | "S3_ACCESS_KEY" | "S3_SECRET_KEY" | "S3_REGION">) {
    this.bucket = env.S3_BUCKET;
    this.client = new S3Client({
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
    const upload = new Upload({
      client: this.client,
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
    const stream = await this.open(key, range);
    try {
      for await (const chunk of stream) yield chunk as Uint8Array;
    } finally {
      stream.destroy();
    }
  }

  private async open(key: string, range?: ObjectRange): Promise<Readable> {
    try {
      const found = await this.client.send(
        new GetObjectCommand({
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
    try {
      const found = await this.client.send(new HeadObjectCommand({ Bucket: this.bucket, Key: key }));
      return { bytes: found.ContentLength ?? 0 };
    } catch (error) {
      if (isMissing(error)) return null;
      throw error;
    }
  }

  async copy(from: string, to: string): Promise<void> {
    const source = `${this.bucket}/${from.split("/").map(encodeURIComponent).join("/")}`;
    await this.client.send(new CopyObjectCommand({ Bucket: this.bucket, Key: to, CopySource: source }));
  }

  async delete(key: string): Promise<void> {
    await this.client.send(new DeleteObjectCommand({ Bucket: this.bucket, Key: key }));
  }

  async *list(prefix: string): AsyncIterable<{ key: string; bytes: number; modifiedAt: Date | null }> {
    let next: string | undefined;
    do {
      const page = await this.client.send(
        new ListObjectsV2Command({ Bucket: this.bucket, Prefix: prefix, ContinuationToken: next }),
      );
      for (const entry of page.Contents ?? []) {
        if (entry.Key) yield { key: entry.Key, bytes: entry.Size ?? 0, modifiedAt: entry.LastModified ?? null };
      }
      next = page.NextContinuationToken;
    } while (next);
  }

  async ping(): Promise<void> {
    await this.client.send(new HeadBucketCommand({ Bucket: this.bucket }));
  }
}
