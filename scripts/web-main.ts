import { createServer } from "node:http";
import next from "next";
import { findAddressFault, MAX_HEADER_BYTES, refuseAddress, refuseUnreadable } from "@/lib/server/web/refuse-address";

/** How long requests under way may take to end once the program is told to stop. */
const GRACE_MS = 8_000;

/**
 * The web process: Next's handler behind a door of ours, which answers what the framework cannot (addresses that cannot
 * be decoded, addresses and headers without end) before any of it is read.
 */
async function startWeb(): Promise<void> {
  const port = Number(process.env.PORT ?? 3000);
  const hostname = process.env.HOST ?? "127.0.0.1";
  const application = next({ dev: false, dir: process.cwd(), hostname, port });
  await application.prepare();
  const handle = application.getRequestHandler();
  const server = createServer({ maxHeaderSize: MAX_HEADER_BYTES }, (request, response) => {
    const fault = findAddressFault(request);
    if (fault) return refuseAddress(request, response, fault);
    handle(request, response).catch((error: unknown) => {
      console.error("a request was not handled:", error);
      if (!response.headersSent) response.writeHead(500);
      response.end();
    });
  });
  server.on("clientError", refuseUnreadable);
  const stop = () => {
    server.close(() => process.exit(0));
    server.closeIdleConnections();
    setTimeout(() => process.exit(0), GRACE_MS).unref();
  };
  for (const signal of ["SIGINT", "SIGTERM"] as const) process.once(signal, stop);
  server.listen(port, hostname, () => process.send?.({ ready: true }));
}

startWeb().catch((error: unknown) => {
  console.error(error);
  process.exit(1);
});
