import "server-only";
import { readBody } from "@/app/_server/read-body";
import { withOrganisation } from "@/db/client";
import {
  claimKey,
  findKey,
  keepReply,
  releaseKey,
  type KeptReply,
  type RequestKey,
} from "@/db/queries/idempotency-keys";
import { AppError } from "@/lib/errors";
import type { Scope } from "@/lib/scope";
import { openText, sealText } from "@/lib/server/access/seal-text";
import { hashSecret } from "@/lib/server/access/secrets";
import type { Container } from "@/lib/server/container";

/** How long a repeated request waits for the first one's reply. */
const WAIT_MS = 10_000;
const WAIT_STEP_MS = 100;
/** A first request without a reply after this long has died. An upload of the largest file takes less. */
const STALE_MS = 60 * 60_000;
const KEPT_MS = 48 * 60 * 60_000;

interface Task {
  request: Request;
  scope: Scope;
  container: Container;
  handle: (request: Request) => Promise<Response>;
}

interface Keyed extends Task {
  salt: string;
  requestKey: RequestKey;
  fingerprint: string;
}

/** Multipart uploads are streamed, never held to be hashed: for them the key alone decides. */
async function fingerprintOf(request: Request): Promise<{ fingerprint: string; received: Request }> {
  if (/^multipart\//i.test(request.headers.get("content-type") ?? "")) {
    return { fingerprint: "multipart", received: request };
  }
  const body = await readBody(request);
  const { method, headers } = request;
  const received = new Request(request.url, { method, headers, body: body.length > 0 ? body : null });
  return { fingerprint: hashSecret(Buffer.from(body).toString("base64")), received };
}

function restore(reply: KeptReply, task: Keyed): Response {
  const body = openText(reply.body, task.container.env.AUTH_SECRET, task.salt);
  const headers = new Headers({ "content-type": "application/json", "cache-control": "private, no-store" });
  headers.set("idempotency-replayed", "true");
  if (reply.location) headers.set("location", reply.location);
  return new Response(body || null, { status: reply.status, headers });
}

async function waitForReply(task: Keyed): Promise<Response> {
  for (let waitedMs = 0; waitedMs <= WAIT_MS; waitedMs += WAIT_STEP_MS) {
    const found = await withOrganisation(task.scope, (tx) => findKey(tx, task.scope, task.requestKey));
    if (found && found.fingerprint !== task.fingerprint) {
      throw new AppError("unprocessable", "This Idempotency-Key was used with another body.", {
        detailCode: "idempotency_key_reused",
      });
    }
    if (found?.reply) return restore(found.reply, task);
    if (!found) break;
    await new Promise((resolve) => setTimeout(resolve, WAIT_STEP_MS));
  }
  throw new AppError(
    "conflict",
    "A request with this Idempotency-Key is still at work or has just failed. Try again.",
    {
      detailCode: "idempotency_in_progress",
      extra: { retryAfterS: 5 },
    },
  );
}

async function keep(response: Response, task: Keyed): Promise<Response> {
  const text = await response.text();
  const reply = {
    status: response.status,
    location: response.headers.get("location"),
    body: sealText(text, task.container.env.AUTH_SECRET, task.salt),
  };
  await withOrganisation(task.scope, (tx) => keepReply(tx, task.scope, { ...task.requestKey, reply }));
  return new Response(text || null, { status: response.status, headers: response.headers });
}

async function runFirst(task: Keyed, received: Request): Promise<Response> {
  const release = () => withOrganisation(task.scope, (tx) => releaseKey(tx, task.scope, task.requestKey));
  try {
    const response = await task.handle(received);
    if (response.ok) return await keep(response, task);
    await release();
    return response;
  } catch (error) {
    await release();
    throw error;
  }
}

/**
 * Runs a POST with an `Idempotency-Key` once: a repetition gets the first reply, a simultaneous one waits for it.
 * Failures are not kept. Replies may hold a token that is shown once, so they are sealed with the caller's key,
 * of which only the SHA-256 is kept.
 */
export async function onlyOnce(task: Task): Promise<Response> {
  const salt = task.request.headers.get("idempotency-key");
  if (!salt || task.request.method !== "POST") return task.handle(task.request);
  if (salt.length > 200) throw new AppError("unprocessable", "An Idempotency-Key has at most 200 characters.");
  const { fingerprint, received } = await fingerprintOf(task.request);
  const { pathname, search } = new URL(task.request.url);
  const keyed: Keyed = { ...task, salt, fingerprint, requestKey: { key: hashSecret(salt), route: pathname + search } };
  const now = task.container.clock.now().getTime();
  const isFirst = await withOrganisation(task.scope, (tx) =>
    claimKey(tx, task.scope, {
      ...keyed.requestKey,
      fingerprint,
      staleBefore: new Date(now - STALE_MS),
      expiredBefore: new Date(now - KEPT_MS),
    }),
  );
  return isFirst ? runFirst(keyed, received) : waitForReply(keyed);
}
