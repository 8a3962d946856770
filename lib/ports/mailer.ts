export interface MailMessage {
  to: string;
  subject: string;
  text: string;
  html?: string;
}

export interface Mailer {
  /** @throws AppError `unavailable` when the mail server does not take it. */
  send(message: MailMessage): Promise<void>;
}
