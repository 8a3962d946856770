import { mkdirSync } from "node:fs";
import S3rver from "s3rver";

/** A local stand-in for an object store: an S3 server on a folder. Loopback only. */
export async function startObjectStore(input: {
  folder: string;
  port: number;
  bucket: string;
}): Promise<{ port: number; close(): Promise<void> }> {
  mkdirSync(input.folder, { recursive: true });
  const server = new S3rver({
    address: "127.0.0.1",
    port: input.port,
    directory: input.folder,
    silent: true,
    resetOnClose: false,
    configureBuckets: [{ name: input.bucket, configs: [] }],
  });
  const address = await server.run();
  return { port: address.port, close: () => server.close() };
}
