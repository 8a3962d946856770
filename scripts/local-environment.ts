import { randomBytes } from "node:crypto";
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { ensureDatabase, startCluster, type Cluster } from "@/scripts/cluster";
import { choosePort } from "@/scripts/find-port";

/** What the programs are told, and what this start must end again. */
export interface LocalEnvironment {
  variables: NodeJS.ProcessEnv;
  cluster: Cluster | null;
  baseUrl: string;
  /** Page that lists caught mail; null where a real mail server is used. */
  mailPage: string | null;
  needsFakes: boolean;
}

/** The secret that signs sessions on this machine, made once. */
function localSecret(dataDir: string): string {
  const path = join(dataDir, "auth-secret");
  if (!existsSync(path)) {
    writeFileSync(path, randomBytes(48).toString("base64url"), { mode: 0o600 });
    chmodSync(path, 0o600);
  }
  return readFileSync(path, "utf8").trim();
}

/** Reads KEY=value lines of .env, which never override what is set already. */
function loadEnvFile(path: string): void {
  if (!existsSync(path)) return;
  for (const line of readFileSync(path, "utf8").split("\n")) {
    const match = /^\s*([A-Z0-9_]+)\s*=\s*(.*?)\s*$/.exec(line);
    if (match?.[1] && process.env[match[1]] === undefined)
      process.env[match[1]] = match[2]?.replace(/^(["'])(.*)\1$/, "$2");
  }
}

async function databaseVariables(
  dataDir: string,
  purpose: "local" | "test",
  database: string,
): Promise<{ cluster: Cluster | null; variables: NodeJS.ProcessEnv }> {
  const { DATABASE_URL, DATABASE_ADMIN_URL } = process.env;
  if (DATABASE_URL && DATABASE_ADMIN_URL && purpose === "local") {
    return { cluster: null, variables: { NODE_ENV: "production", DATABASE_URL, DATABASE_ADMIN_URL } };
  }
  const folder = purpose === "test" ? "test-postgres" : "postgres";
  const cluster = await startCluster({ dataDir: join(dataDir, folder), purpose });
  await ensureDatabase(cluster, database);
  return {
    cluster,
    variables: {
      NODE_ENV: "production",
      DATABASE_URL: cluster.appUrl(database),
      DATABASE_ADMIN_URL: cluster.adminUrl(database),
    },
  };
}

/** A server on a folder is started where one is asked for, and where an earlier start left uploads in its way of keeping them. */
function needsStoreServer(dataDir: string): boolean {
  if (process.env.S3_ENDPOINT) return false;
  return Boolean(process.env.FAKE_S3_PORT) || existsSync(join(dataDir, "objects"));
}

/** Settings of the fakes, for those of the two services that no variable names. */
async function fakeVariables(dataDir: string): Promise<Record<string, string>> {
  const s3Port = needsStoreServer(dataDir) ? await choosePort("FAKE_S3_PORT", 9100) : null;
  const smtpPort = await choosePort("FAKE_SMTP_PORT", 9300);
  const mailPort = await choosePort("FAKE_MAIL_PORT", 9500);
  return {
    ...(s3Port ? { FAKE_S3_PORT: String(s3Port), S3_ENDPOINT: `http://127.0.0.1:${s3Port}` } : {}),
    FAKE_SMTP_PORT: String(smtpPort),
    FAKE_MAIL_PORT: String(mailPort),
    SMTP_URL: process.env.SMTP_URL || `smtp://127.0.0.1:${smtpPort}?ignoreTLS=true`,
  };
}

/** Database, secret, ports and addresses of this checkout; starts the cluster. */
export async function prepareLocalEnvironment(input: {
  purpose: "local" | "test";
  database?: string;
  dataDir?: string;
  mode?: "development" | "production";
}): Promise<LocalEnvironment> {
  if (input.purpose === "local") loadEnvFile(".env");
  const dataDir = input.dataDir ?? process.env.DATA_DIR ?? ".data";
  mkdirSync(dataDir, { recursive: true });
  const { cluster, variables } = await databaseVariables(dataDir, input.purpose, input.database ?? "coulterbook");
  const needsFakes = input.purpose === "test" || !(process.env.S3_ENDPOINT && process.env.SMTP_URL);
  const fakes: Record<string, string> = needsFakes ? await fakeVariables(dataDir) : {};
  const port = input.purpose === "test" ? await choosePort("", 4300) : await choosePort("PORT", 3000);
  const baseUrl = (input.purpose === "local" && process.env.BASE_URL) || `http://127.0.0.1:${port}`;
  const secret = process.env.AUTH_SECRET
    ? { AUTH_SECRET: process.env.AUTH_SECRET }
    : { AUTH_SECRET: localSecret(dataDir), AUTH_SECRET_IS_LOCAL: "1" };
  return {
    cluster,
    baseUrl,
    needsFakes,
    mailPage: fakes.FAKE_MAIL_PORT ? `http://127.0.0.1:${fakes.FAKE_MAIL_PORT}` : null,
    variables: {
      ...process.env,
      ...variables,
      ...fakes,
      ...secret,
      NODE_ENV: input.mode ?? "production",
      NEXT_TELEMETRY_DISABLED: "1",
      // The version that is pinned works on this Node; the notice would only worry people.
      AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: "true",
      NEXTAUTH_SECRET: secret.AUTH_SECRET,
      NEXTAUTH_URL: baseUrl,
      PORT: String(port),
      BASE_URL: baseUrl,
      DATA_DIR: dataDir,
      FILES_DIR: process.env.FILES_DIR ?? join(dataDir, "files"),
    },
  };
}
