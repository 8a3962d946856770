// The local fakes as one process: an object store on a folder (where one is asked for) and a mail catcher with a page. Loopback only.
import { startMailCatcher } from "@/lib/server/fakes/mail-catcher";
import { startObjectStore } from "@/lib/server/fakes/object-store";

const number = (name: string) => Number(process.env[name] ?? 0);

// Without a port, files are kept in a folder and nobody asks for a store.
const port = number("FAKE_S3_PORT");
const folder = `${process.env.DATA_DIR ?? ".data"}/objects`;
const store =
  port > 0 ? await startObjectStore({ folder, port, bucket: process.env.S3_BUCKET ?? "coulterbook" }) : null;
const mail = await startMailCatcher({ smtpPort: number("FAKE_SMTP_PORT"), webPort: number("FAKE_MAIL_PORT") });
process.send?.({ ready: true });

async function stop(): Promise<void> {
  setTimeout(() => process.exit(0), 2000).unref();
  await Promise.all([store?.close(), mail.close()]);
  process.exit(0);
}
process.once("SIGTERM", () => void stop());
process.once("SIGINT", () => void stop());
