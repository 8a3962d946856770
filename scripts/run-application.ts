import { startNode, runNode, waitForAnswer, type Child } from "@/scripts/child-process";
import type { LocalEnvironment } from "@/scripts/local-environment";

const NEXT = "node_modules/next/dist/bin/next";

/** Everything that runs for one application; `stop` ends it in the order in which nothing is lost. */
export interface RunningApplication {
  children: Child[];
  stop(): Promise<void>;
}

/** Fakes first, then migrations and the demo, then worker and web. */
export async function runApplication(
  local: LocalEnvironment,
  options: {
    web: "start" | "dev" | "none";
    seed: boolean;
    worker?: boolean;
    quiet?: boolean;
    onStarted?(child: Child): void;
  },
): Promise<RunningApplication> {
  const children: Child[] = [];
  const environment = local.variables;
  const stop = async () => {
    for (const child of [...children].reverse()) await child.stop();
    local.cluster?.stop();
  };
  const begin = (name: string, script: string, parameters: string[] = []) => {
    const child = startNode({ name, script, arguments: parameters, environment, quiet: options.quiet });
    children.push(child);
    options.onStarted?.(child);
    return child;
  };
  try {
    if (local.needsFakes) await begin("The local fakes", "build/fakes.mjs").ready;
    await runNode({ name: "The migrations", script: "build/migrate.mjs", environment });
    if (options.seed) await runNode({ name: "The demo data", script: "build/seed.mjs", environment });
    if (options.worker !== false) await begin("The worker", "build/worker.mjs").ready;
    if (options.web !== "none") {
      const host = ["-H", process.env.HOST ?? "127.0.0.1", "-p", String(environment.PORT)];
      const web =
        options.web === "dev"
          ? begin("The web server", NEXT, ["dev", ...host])
          : begin("The web server", "build/web.mjs");
      await waitForAnswer(`http://127.0.0.1:${environment.PORT}/api/health`, web, 120_000);
    }
  } catch (error) {
    await stop();
    throw error;
  }
  return { children, stop };
}
