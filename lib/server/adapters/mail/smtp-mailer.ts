import { createTransport, type Transporter } from "nodemailer";
import { AppError } from "@/lib/errors";
import type { Mailer, MailMessage } from "@/lib/ports/mailer";
import type { Environment } from "@/lib/server/env";

/** Sends through the server that SMTP_URL names. */
export class SmtpMailer implements Mailer {
  private readonly transport: Transporter;
  private readonly from: string;

  constructor(env: Pick<Environment, "SMTP_URL" | "MAIL_FROM">) {
    this.from = env.MAIL_FROM;
    this.transport = createTransport(env.SMTP_URL);
  }

  async send(message: MailMessage): Promise<void> {
    try {
      await this.transport.sendMail({ from: this.from, ...message });
    } catch (error) {
      throw new AppError("unavailable", "The mail could not be sent: the mail server does not answer", {
        cause: error,
      });
    }
  }
}
