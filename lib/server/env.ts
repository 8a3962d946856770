import { z } from "zod";

const port = z.coerce.number().int().min(1).max(65_535);
const flag = z
  .enum(["0", "1", ""])
  .default("")
  .transform((text) => text === "1");

const EnvSchema = z.object({
  NODE_ENV: z.enum(["development", "test", "production"]).default("development"),
  /** The application's role, under row-level security. */
  DATABASE_URL: z.string().min(1),
  /** The owner's role: migrations, sign-in, token and share look-ups, bulk writes of the worker. */
  DATABASE_ADMIN_URL: z.string().min(1),
  PORT: port.default(3000),
  BASE_URL: z.url().optional(),
  AUTH_SECRET: z.string().min(16),
  /** Set by the local start when it made the secret itself. */
  AUTH_SECRET_IS_LOCAL: flag,
  DEMO: z.enum(["0", "1", ""]).default(""),
  /** Folder for files, where no object store is named. */
  FILES_DIR: z.string().default(""),
  /** The object store; it comes before the folder. */
  S3_ENDPOINT: z.string().default(""),
  S3_BUCKET: z.string().min(3).default("coulterbook"),
  S3_ACCESS_KEY: z.string().min(1).default("S3RVER"),
  S3_SECRET_KEY: z.string().min(1).default("S3RVER"),
  S3_REGION: z.string().min(1).default("us-east-1"),
  SMTP_URL: z.string().min(1),
  MAIL_FROM: z.string().min(3).default("Coulterbook <no-reply@larkspur.example>"),
  DATA_DIR: z.string().min(1).default(".data"),
  /** Compiled worker, threads and tools. */
  BUILD_DIR: z.string().min(1).default("build"),
  MAX_UPLOAD_BYTES: z.coerce.number().int().positive().default(1_073_741_824),
  /** Logs one worker process reads at the same time. */
  WORKER_CONCURRENCY: z.coerce.number().int().min(1).max(16).default(2),
  /** Longest time one log may take, in seconds. */
  READ_LIMIT_S: z.coerce.number().positive().default(900),
  /** Memory of the whole worker process above which the reading log is stopped, in MiB. */
  WORKER_MEMORY_MIB: z.coerce.number().int().min(128).default(3072),
});

export interface Environment extends z.infer<typeof EnvSchema> {
  baseUrl: string;
  /** Demo accounts may be shown: never in production with a real secret, unless asked for. */
  isDemo: boolean;
}

/** Reads the environment. @throws Error naming every variable that is missing or wrong. */
export function parseEnv(source: Record<string, string | undefined>): Environment {
  const parsed = EnvSchema.safeParse(source);
  if (!parsed.success) {
    const faults = parsed.error.issues.map((issue) => `${issue.path.join(".")}: ${issue.message}`);
    throw new Error(`The environment is not complete. ${faults.join("; ")}. See .env.example`);
  }
  const values = parsed.data;
  if (!values.S3_ENDPOINT && !values.FILES_DIR) {
    throw new Error("The environment is not complete. Name S3_ENDPOINT or FILES_DIR. See .env.example");
  }
  const isProduction = values.NODE_ENV === "production" && !values.AUTH_SECRET_IS_LOCAL;
  return {
    ...values,
    baseUrl: (values.BASE_URL ?? `http://127.0.0.1:${values.PORT}`).replace(/\/$/, ""),
    isDemo: values.DEMO === "1" || (values.DEMO !== "0" && !isProduction),
  };
}

let parsedEnv: Environment | undefined;

/** The process's environment, parsed once. */
export function env(): Environment {
  return (parsedEnv ??= parseEnv(process.env));
}
