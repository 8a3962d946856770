import "server-only";
import { container } from "@/app/_server/container";
import { credentialsOf, identifyRequest, ORGANISATION_COOKIE } from "@/app/_server/identify-request";
import { refuseForeignOrigin } from "@/app/_server/refuse-foreign-origin";
import { readCookie } from "@/app/_server/session-cookie";
import { toResponse } from "@/app/_server/to-response";
import { onlyOnce } from "@/app/_server/only-once";
import { can, type Permission } from "@/lib/access/permissions";
import { AppError } from "@/lib/errors";
import type { Scope } from "@/lib/scope";
import { chooseOrganisation } from "@/lib/server/access/choose-organisation";
import { forgetAccess, recallAccess } from "@/lib/server/access/recent-access";
import type { Identity } from "@/lib/server/access/authenticate";
import type { Container } from "@/lib/server/container";

export interface RouteContext<Name extends string> {
  params: Promise<Record<Name, string>>;
}

export interface PublicInput<Name extends string> {
  params: Record<Name, string>;
  request: Request;
  url: URL;
  container: Container;
}

export interface ScopedInput<Name extends string> extends PublicInput<Name> {
  scope: Scope;
  identity: Identity;
}

type RouteHandler<Name extends string> = (request: Request, context: RouteContext<Name>) => Promise<Response>;

async function readParams<Name extends string>(context: RouteContext<Name>): Promise<Record<Name, string>> {
  const params = await context.params;
  // PostgreSQL takes no NUL in text; an address with one names nothing.
  if (JSON.stringify(params ?? {}).includes("\\u0000")) throw new AppError("not_found", "There is nothing here.");
  return params;
}

interface Access {
  identity: Identity;
  scope: Scope;
}

async function findAccess(request: Request): Promise<Access> {
  const identity = await identifyRequest(request);
  if (!identity.token) refuseForeignOrigin(request, container().env.baseUrl);
  return { identity, scope: await scopeOf(request, identity) };
}

async function scopeOf(request: Request, identity: Identity): Promise<Scope> {
  const { scope } = await chooseOrganisation(identity, {
    demanded: request.headers.get("x-organisation"),
    preferred: readCookie(request.headers.get("cookie"), ORGANISATION_COOKIE),
  });
  return scope;
}

function refuseLowRole(scope: Scope, permission: Permission): void {
  if (can(scope.role, permission)) return;
  throw new AppError("forbidden", `Your role, ${scope.role}, does not allow this (${permission}).`);
}

/** What holds for every reply of the API, unless the route said otherwise. Pages get theirs in proxy.ts. */
function withApiHeaders(response: Response): Response {
  const { headers } = response;
  headers.set("x-content-type-options", "nosniff");
  if (!headers.has("cache-control")) headers.set("cache-control", "private, no-store");
  if (!headers.has("referrer-policy")) headers.set("referrer-policy", "no-referrer");
  return response;
}

interface ScopeOptions {
  /** Who asks and with what role is looked up once in two seconds: for pictures that a page asks for by the dozen. */
  recallsAccess?: boolean;
}

const READING = new Set(["GET", "HEAD", "OPTIONS"]);

/**
 * Wraps a route that needs an account: who asks, in which organisation, whether the role allows it, same origin,
 * Idempotency-Key, and every error as problem+json. Name the address's parameters: `withScope<"fieldId">(...)`.
 */
export function withScope<Name extends string = never>(
  permission: Permission,
  handler: (input: ScopedInput<Name>) => Promise<Response>,
  options: ScopeOptions = {},
): RouteHandler<Name> {
  return async (request, context) => {
    const onlyReads = READING.has(request.method);
    try {
      const outside = container();
      const find = () => findAccess(request);
      const isRecalled = options.recallsAccess && onlyReads;
      const { identity, scope } = await (isRecalled ? recallAccess(credentialsOf(request), find) : find());
      refuseLowRole(scope, permission);
      const params = await readParams(context);
      const handle = (received: Request) =>
        handler({ scope, identity, params, request: received, url: new URL(request.url), container: outside });
      return withApiHeaders(await onlyOnce({ request, scope, container: outside, handle }));
    } catch (error) {
      return withApiHeaders(toResponse(error));
    } finally {
      if (!onlyReads) forgetAccess();
    }
  };
}

/** Wraps a route that anybody may call: health, the description of the API, share links. */
export function withPublic<Name extends string = never>(
  handler: (input: PublicInput<Name>) => Promise<Response>,
): RouteHandler<Name> {
  return async (request, context) => {
    try {
      const params = await readParams(context);
      return withApiHeaders(await handler({ params, request, url: new URL(request.url), container: container() }));
    } catch (error) {
      return withApiHeaders(toResponse(error));
    }
  };
}
