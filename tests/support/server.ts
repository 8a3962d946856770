import { randomBytes } from "node:crypto";
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { Client } from "pg";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { runNode, startNode, waitForAnswer, type Child } from "@/scripts/child-process";
import { findFreePort } from "@/scripts/find-port";

/** The built application as a person meets it: web, worker and fakes as processes of their own, on a database of its own. */
export interface TestServer {
  baseUrl: string;
  /** Page and `mails.json` of the mail catcher. */
  mailUrl: string;
  databaseAdminUrl: string;
  environment: NodeJS.ProcessEnv;
  web: Child;
  worker: Child;
  /** Starts another worker, for instance after one was killed. */
  startWorker: () => Promise<Child>;
  /** The cookie header of a demo person who signed in through the ordinary form. */
  signIn: (email: string, password?: string) => Promise<string>;
  close: () => Promise<void>;
}

export interface TestServerOptions {
  /** Fill the database with the demo farm. */
  seed?: boolean;
  environment?: Record<string, string>;
}

async function runSql(statement: string): Promise<void> {
  const client = new Client({ connectionString: process.env.TEST_DATABASE_ADMIN_URL });
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}

function databaseUrl(name: string, user: string): string {
  const url = new URL(process.env.TEST_DATABASE_ADMIN_URL ?? "");
  url.pathname = `/${name}`;
  url.username = user;
  return url.toString();
}

async function testEnvironment(name: string, folder: string, extra: Record<string, string>) {
  const first = 31_000 + Math.floor(Math.random() * 20_000);
  const [port, s3, smtp, mail] = [0, 1, 2, 3].map((step) => findFreePort(first + step * 50));
  const baseUrl = `http://127.0.0.1:${await port}`;
  return {
    ...process.env,
    NODE_ENV: "production" as const,
    NEXT_TELEMETRY_DISABLED: "1",
    DATABASE_URL: databaseUrl(name, "coulterbook_app"),
    DATABASE_ADMIN_URL: databaseUrl(name, "app"),
    PORT: String(await port),
    BASE_URL: baseUrl,
    NEXTAUTH_URL: baseUrl,
    AUTH_SECRET: "only-for-tests-0123456789",
    NEXTAUTH_SECRET: "only-for-tests-0123456789",
    AUTH_SECRET_IS_LOCAL: "1",
    DEMO: "1",
    DATA_DIR: folder,
    FAKE_S3_PORT: String(await s3),
    FAKE_SMTP_PORT: String(await smtp),
    FAKE_MAIL_PORT: String(await mail),
    S3_ENDPOINT: `http://127.0.0.1:${await s3}`,
    SMTP_URL: `smtp://127.0.0.1:${await smtp}?ignoreTLS=true`,
    ...extra,
  };
}

/** Signs in as a script does: the token, then the form; answers the cookies. */
export async function signInAt(baseUrl: string, email: string, password: string): Promise<string> {
  const read = (response: Response) => response.headers.getSetCookie().map((cookie) => cookie.split(";")[0] ?? "");
  const asked = await fetch(`${baseUrl}/api/auth/csrf`);
  const { csrfToken } = (await asked.json()) as { csrfToken: string };
  const csrfCookies = read(asked);
  const answer = await fetch(`${baseUrl}/api/auth/callback/credentials`, {
    method: "POST",
    redirect: "manual",
    headers: { "content-type": "application/x-www-form-urlencoded", cookie: csrfCookies.join("; ") },
    body: new URLSearchParams({ csrfToken, email, password, json: "true" }),
  });
  const cookies = [...csrfCookies, ...read(answer)];
  if (!cookies.some((cookie) => cookie.includes("session-token="))) {
    throw new Error(`${email} could not sign in: ${answer.status} ${await answer.text()}`);
  }
  return cookies.join("; ");
}

/** Starts the built application (`npm run build` first). Everything it starts ends with `close`. */
export async function startTestServer(options: TestServerOptions = {}): Promise<TestServer> {
  const name = `t_${randomBytes(6).toString("hex")}`;
  await runSql(`create database ${name}`);
  const folder = mkdtempSync(path.join(tmpdir(), "coulterbook-e2e-"));
  const environment = await testEnvironment(name, folder, options.environment ?? {});
  const build = process.env.BUILD_DIR ?? "build";
  const children: Child[] = [];
  const begin = (label: string, script: string, parameters: string[] = [], keepsErrors = false) => {
    const child = startNode({ name: label, script, arguments: parameters, environment, quiet: true, keepsErrors });
    children.push(child);
    return child;
  };
  const startWorker = async () => {
    const worker = begin("worker", `${build}/worker.mjs`);
    await worker.ready;
    return worker;
  };
  const close = async () => {
    for (const child of children.reverse()) await child.stop(5_000);
    await runSql(`drop database if exists ${name} with (force)`);
    rmSync(folder, { recursive: true, force: true });
  };
  try {
    await begin("fakes", `${build}/fakes.mjs`).ready;
    await runNode({ name: "migrations", script: `${build}/migrate.mjs`, environment });
    const seedEnvironment = { ...environment, SEED_LOGS: options.seed === false ? "0" : "1" };
    await runNode({ name: "demo data", script: `${build}/seed.mjs`, environment: seedEnvironment });
    const worker = await startWorker();
    const web = begin("web", `${build}/web.mjs`, [], true);
    await waitForAnswer(`${environment.BASE_URL}/api/health`, web, 60_000);
    return {
      baseUrl: environment.BASE_URL,
      mailUrl: `http://127.0.0.1:${environment.FAKE_MAIL_PORT}`,
      databaseAdminUrl: environment.DATABASE_ADMIN_URL,
      environment,
      web,
      worker,
      startWorker,
      signIn: (email, password = DEMO_PASSWORD) => signInAt(environment.BASE_URL, email, password),
      close,
    };
  } catch (error) {
    await close();
    throw error;
  }
}
