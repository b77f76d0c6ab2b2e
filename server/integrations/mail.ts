import { createTransport } from 'nodemailer';
import type { Config } from '#server/config.ts';

export type MailMessage = {
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  /** Stable over repeats of the same mail, so that a mail program shows it once. */
  readonly messageId: string;
};

/** The mail server, as far as Millpond uses it. */
export interface Mailer {
  send(message: MailMessage): Promise<void>;
  close(): void;
}

const patience = { connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 30_000 };

/** Plain text mails over SMTP; a refusal is thrown and the job that sent it is tried again. */
export function createMailer(config: Config['mail']): Mailer {
  const transport = createTransport({ url: config.smtpUrl, ...patience });
  return {
    async send(message) {
      await transport.sendMail({
        from: config.from,
        to: message.to,
        subject: message.subject,
        text: message.text,
        messageId: message.messageId,
        disableFileAccess: true,
        disableUrlAccess: true,
      });
    },
    close() {
      transport.close();
    },
  };
}
