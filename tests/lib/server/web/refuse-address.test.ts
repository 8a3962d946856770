import { once } from "node:events";
import { createServer, type Server } from "node:http";
import { connect, type AddressInfo } from "node:net";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { findAddressFault, MAX_HEADER_BYTES, refuseAddress, refuseUnreadable } from "@/lib/server/web/refuse-address";

let server: Server;

beforeAll(async () => {
  server = createServer({ maxHeaderSize: MAX_HEADER_BYTES }, (request, response) => {
    const fault = findAddressFault(request);
    if (fault) return refuseAddress(request, response, fault);
    response.end("taken");
  });
  server.on("clientError", refuseUnreadable);
  server.listen(0, "127.0.0.1");
  await once(server, "listening");
});
afterAll(() => {
  server.closeAllConnections();
  server.close();
});

/** The first bytes of the answer to a request as it stands, with nothing put right by a client. */
async function send(path: string, header = ""): Promise<string> {
  const socket = connect((server.address() as AddressInfo).port, "127.0.0.1");
  socket.on("error", () => undefined);
  const lines = [
    `GET ${path} HTTP/1.1`,
    "Host: localhost",
    "Connection: close",
    ...(header ? [`X-Long: ${header}`] : []),
  ];
  socket.write([...lines, "", ""].join("\r\n"));
  const [answer] = (await once(socket, "data")) as [Buffer];
  socket.destroy();
  return answer.toString("utf8");
}

const statusOf = (answer: string) => Number(/^HTTP\/1\.1 (\d+)/.exec(answer)?.[1]);

describe("addresses that cannot be decoded", () => {
  it("get a problem under /api and a page elsewhere, both 400", async () => {
    const problem = await send("/api/v1/fields/%ff");
    expect(statusOf(problem)).toBe(400);
    expect(problem).toContain("content-type: application/problem+json");
    expect(problem).toContain('"code":"malformed_address"');
    for (const path of ["/s/%ff", "/s/%", "/larkspur-flats/fields/%E0%A4", "/%c0%af"]) {
      const page = await send(path);
      expect(statusOf(page), path).toBe(400);
      expect(page).toContain("content-type: text/html");
    }
  });

  it("leave well-formed ones alone, and what stands behind the question mark", async () => {
    for (const path of ["/s/%C3%A9", "/api/v1/fields/%2F", "/?q=%ff", "/a%20b"]) {
      expect(await send(path), path).toContain("taken");
    }
  });
});

describe("what has no end", () => {
  it("answers 414 to a long address, at once", async () => {
    for (const length of [9_000, 20_000, 60_000]) expect(statusOf(await send(`/${"a".repeat(length)}`))).toBe(414);
  });

  it("answers 431 to long headers, at once", async () => {
    for (const length of [17_000, 60_000]) expect(statusOf(await send("/", "a".repeat(length)))).toBe(431);
  });

  it("answers 400 to what is no HTTP", async () => {
    const answer = await send("/ with spaces");
    expect(statusOf(answer)).toBe(400);
    expect(answer).toContain("connection: close");
  });
});
