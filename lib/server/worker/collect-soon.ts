import { setFlagsFromString } from "node:v8";
import { runInNewContext } from "node:vm";

/** Long enough that whoever waits for the answer has it first. */
const AFTER_MS = 30;

let collect: (() => void) | undefined;

function loadCollector(): () => void {
  setFlagsFromString("--expose-gc");
  const found: unknown = runInNewContext("gc");
  return typeof found === "function" ? () => void Reflect.apply(found, undefined, []) : () => undefined;
}

/**
 * Gives back the memory of a log that is done. Its readings lie outside the heap: small objects that hold tens of megabytes, which
 * the engine sees no reason to look for until the next logs have piled up on them.
 */
export function collectSoon(): void {
  setTimeout(() => {
    collect ??= loadCollector();
    collect();
  }, AFTER_MS).unref();
}
