import type { MailMessage } from "@/lib/ports/mailer";
import type { Container } from "@/lib/server/container";
import { parseEnv } from "@/lib/server/env";

export interface TestContainer extends Container {
  sentMail: MailMessage[];
  queued: { name: string; payload: unknown }[];
  objects: Map<string, Uint8Array>;
  /** Moves the clock. */
  setNow: (now: Date | null) => void;
}

async function collect(body: AsyncIterable<Uint8Array> | Uint8Array): Promise<Uint8Array> {
  if (body instanceof Uint8Array) return body;
  const chunks: Uint8Array[] = [];
  for await (const chunk of body) chunks.push(chunk);
  return new Uint8Array(Buffer.concat(chunks));
}

function memoryStorage(objects: Map<string, Uint8Array>): Container["storage"] {
  return {
    put: async (key, body) => {
      const bytes = await collect(body);
      objects.set(key, bytes);
      return { bytes: bytes.length };
    },
    get: async function* (key, range) {
      const bytes = objects.get(key);
      if (!bytes) throw new Error(`no object ${key}`);
      yield range ? bytes.subarray(range.start, range.end + 1) : bytes;
    },
    head: async (key) => (objects.has(key) ? { bytes: objects.get(key)!.length } : null),
    copy: async (from, to) => void objects.set(to, objects.get(from)!),
    delete: async (key) => void objects.delete(key),
    list: async function* (prefix) {
      for (const [key, bytes] of objects)
        if (key.startsWith(prefix)) yield { key, bytes: bytes.length, modifiedAt: null };
    },
    ping: async () => undefined,
  };
}

/** A container whose outside world is memory; the database is the test's own. */
export function makeContainer(changes: Record<string, string> = {}): TestContainer {
  const env = parseEnv({
    NODE_ENV: "test",
    DATABASE_URL: process.env.DATABASE_URL,
    DATABASE_ADMIN_URL: process.env.DATABASE_ADMIN_URL,
    AUTH_SECRET: "only-for-tests-0123456789",
    BASE_URL: "http://localhost:3000",
    S3_ENDPOINT: "http://127.0.0.1:1",
    SMTP_URL: "smtp://127.0.0.1:1",
    ...changes,
  });
  const sentMail: MailMessage[] = [];
  const queued: { name: string; payload: unknown }[] = [];
  const objects = new Map<string, Uint8Array>();
  let frozen: Date | null = null;
  return {
    env,
    sentMail,
    queued,
    objects,
    setNow: (now) => void (frozen = now),
    storage: memoryStorage(objects),
    mailer: { send: async (message) => void sentMail.push(message) },
    queue: {
      send: async (name, payload) => void queued.push({ name, payload }),
      ping: async () => undefined,
      close: async () => undefined,
    },
    clock: { now: () => frozen ?? new Date() },
  };
}
