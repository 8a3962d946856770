import "server-only";
import type { Container } from "@/lib/server/container";
import { createContainer } from "@/lib/server/create-container";
import { env } from "@/lib/server/env";

const shared = globalThis as typeof globalThis & { coulterbookContainer?: Container };

/** The outside world, built once a process; kept across hot reloads and Next's separately bundled routes. */
export function container(): Container {
  return (shared.coulterbookContainer ??= createContainer(env()));
}

/** For tests: a container with their own clock, mailer or storage. */
export function replaceContainer(replacement: Container | undefined): void {
  shared.coulterbookContainer = replacement;
}
