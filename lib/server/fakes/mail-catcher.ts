import { createServer, type IncomingMessage, type Server, type ServerResponse } from "node:http";
import { SMTPServer } from "smtp-server";

/** One mail as it came over SMTP. */
export interface CaughtMail {
  receivedAt: string;
  to: string[];
  subject: string;
  raw: string;
}

const KEPT = 200;

function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (letter) => `&#${letter.charCodeAt(0)};`);
}

function header(raw: string, name: string): string {
  const head = raw.split(/\r?\n\r?\n/, 1)[0] ?? "";
  const unfolded = head.replace(/\r?\n[ \t]+/g, " ");
  return new RegExp(`^${name}:\\s*(.*)$`, "im").exec(unfolded)?.[1]?.trim() ?? "";
}

/** Undoes quoted-printable so that links in the mail can be followed. */
function readable(raw: string): string {
  if (!/quoted-printable/i.test(raw)) return raw;
  const joined = raw.replace(/=\r?\n/g, "");
  return joined.replace(/(?:=[0-9A-F]{2})+/g, (run) => Buffer.from(run.replaceAll("=", ""), "hex").toString("utf8"));
}

function page(mails: readonly CaughtMail[]): string {
  const items = mails.map(
    (mail) =>
      `<article><h2>${escapeHtml(mail.subject || "(no subject)")}</h2><p>${escapeHtml(mail.to.join(", "))} · ${mail.receivedAt}</p><pre>${escapeHtml(readable(mail.raw))}</pre></article>`,
  );
  const body = items.length ? items.join("") : "<p>No mail yet.</p>";
  return `<!doctype html><html lang="en"><meta charset="utf-8"><title>Caught mail</title><style>body{font:16px system-ui;max-width:60rem;margin:2rem auto;padding:0 1rem}pre{white-space:pre-wrap;border:1px solid #ccc;padding:1rem}</style><h1>Mail caught on this machine</h1>${body}</html>`;
}

function answer(request: IncomingMessage, response: ServerResponse, mails: readonly CaughtMail[]): void {
  if (request.url === "/mails.json") {
    response.setHeader("content-type", "application/json");
    response.end(JSON.stringify({ items: mails }));
    return;
  }
  response.setHeader("content-type", "text/html; charset=utf-8");
  response.setHeader("content-security-policy", "default-src 'none'; style-src 'unsafe-inline'");
  response.end(page(mails));
}

function listen(server: Server | SMTPServer, port: number): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once("error", reject);
    server.listen(port, "127.0.0.1", () => resolve());
  });
}

/** A local stand-in for a mail server: nothing leaves this machine; a page lists what would have been sent. */
export async function startMailCatcher(input: {
  smtpPort: number;
  webPort: number;
}): Promise<{ close(): Promise<void> }> {
  const mails: CaughtMail[] = [];
  const smtp = new SMTPServer({
    authOptional: true,
    disabledCommands: ["STARTTLS"],
    onData(stream, session, done) {
      const chunks: Buffer[] = [];
      stream.on("data", (chunk: Buffer) => chunks.push(chunk));
      stream.on("end", () => {
        const raw = Buffer.concat(chunks).toString("utf8");
        const to = session.envelope.rcptTo.map((recipient) => recipient.address);
        mails.unshift({ receivedAt: new Date().toISOString(), to, subject: header(raw, "subject"), raw });
        mails.length = Math.min(mails.length, KEPT);
        done();
      });
    },
  });
  const web = createServer((request, response) => answer(request, response, mails));
  await listen(smtp, input.smtpPort);
  await listen(web, input.webPort);
  const closeSmtp = () => new Promise<void>((resolve) => smtp.close(() => resolve()));
  const closeWeb = () => new Promise<void>((resolve) => web.close(() => resolve()));
  return { close: async () => void (await Promise.all([closeSmtp(), closeWeb()])) };
}
