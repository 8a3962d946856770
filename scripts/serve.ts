import { join } from "node:path";
import { buildAssets, buildCodeIfStale, buildIfStale } from "@/scripts/build-if-stale";
import { prepareLocalEnvironment, type LocalEnvironment } from "@/scripts/local-environment";
import { runApplication, type RunningApplication } from "@/scripts/run-application";
import { takeStartLock } from "@/scripts/start-lock";

function tell(local: LocalEnvironment): void {
  const isDemo = process.env.DEMO !== "0" && (process.env.DEMO === "1" || !process.env.AUTH_SECRET);
  const lines = ["", `  Coulterbook is ready:  ${local.baseUrl}`];
  if (isDemo) {
    lines.push("  Demo accounts: owner@, agronomist@, researcher@, operator@, viewer@larkspur.example");
    lines.push(
      "                 and owner@otherfarm.example; the password stands on the sign-in page and in the README",
    );
  }
  if (local.mailPage) lines.push(`  Mail caught on this machine: ${local.mailPage}`);
  lines.push("  Ctrl-C stops all of it.", "");
  console.log(lines.join("\n"));
}

/** `npm start` and `npm run dev`: brings everything up, waits for a signal or a failure, takes everything down. */
export async function serve(web: "start" | "dev"): Promise<void> {
  const lock = takeStartLock(join(process.env.DATA_DIR ?? ".data", "start.lock"));
  let local: LocalEnvironment | undefined;
  let running: RunningApplication | undefined;
  let isStopping = false;
  const parent = process.ppid;
  const end = async (code: number) => {
    if (isStopping) return;
    isStopping = true;
    clearInterval(watch);
    try {
      if (running) await running.stop();
      else local?.cluster?.stop();
    } finally {
      lock.release();
      process.exit(code);
    }
  };
  for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"] as const) process.on(signal, () => void end(0));
  // When the shell above is killed no signal arrives, but the parent changes.
  const watch = setInterval(() => void (process.ppid === parent || end(0)), 1000);
  try {
    if (web === "start") await buildIfStale();
    else await Promise.all([buildCodeIfStale(), buildAssets()]);
    local = await prepareLocalEnvironment({ purpose: "local", mode: web === "dev" ? "development" : "production" });
    running = await runApplication(local, {
      web,
      seed: true,
      onStarted: (child) =>
        child.process.once("exit", () => {
          if (isStopping || !running) return;
          console.error(`${child.name} ended unexpectedly; stopping.`);
          void end(1);
        }),
    });
    lock.tell(local.baseUrl);
    tell(local);
  } catch (error) {
    console.error(error instanceof Error ? error.message : error);
    await end(1);
  }
}
