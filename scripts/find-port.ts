import { createServer } from "node:net";

/** Whether a loopback port can be taken now. */
export function isPortFree(port: number): Promise<boolean> {
  return new Promise((resolve) => {
    const server = createServer();
    server.once("error", () => resolve(false));
    server.listen({ port, host: "127.0.0.1", exclusive: true }, () => server.close(() => resolve(true)));
  });
}

/** The first free port from `first` upwards. @throws when 200 ports in a row are taken. */
export async function findFreePort(first: number): Promise<number> {
  for (let port = first; port < first + 200; port++) {
    if (await isPortFree(port)) return port;
  }
  throw new Error(`No free port between ${first} and ${first + 199} on 127.0.0.1`);
}

/** The port an environment variable names, which must be free, or the first free one from the default upwards. */
export async function choosePort(variable: string, fallback: number): Promise<number> {
  const wanted = process.env[variable];
  if (!wanted) return findFreePort(fallback);
  const port = Number(wanted);
  if (!Number.isInteger(port) || port < 1 || port > 65535)
    throw new Error(`${variable}=${wanted} is not a port number`);
  if (!(await isPortFree(port)))
    throw new Error(`Port ${port} (from ${variable}) is taken; choose another or leave it out`);
  return port;
}
