import { createTransport } from 'nodemailer';
import type { Config } from '#server/config.ts';

export type MailMessage = {
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  /** Stable over repeats of the same mail, so that a mail program shows it once. */
  readonly messageId: string;
};

/** The mail server, as far as Millpond uses it. */
export interface Mailer {
  send(message: MailMessage): Promise<void>;
  close(): void;
}

const patience = { connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 30_000 };

/**
 * Mails over SMTP, as plain text and HTML. A refusal is thrown and the job that sent it is tried again.
 * After the configured patience the connection is torn down, whatever the server is doing: from then on
 * nothing more is said about this mail.
 */
export function createMailer(config: Config['mail']): Mailer {
  const transport = createTransport({ url: config.smtpUrl, socketCloseTimeout: 0, ...patience });
  return {
    async send(message) {
      await transport.sendMail({
        from: config.from,
        to: message.to,
        subject: message.subject,
        text: message.text,
        html: message.html,
        messageId: message.messageId,
        // Out-of-office programs leave such mail unanswered.
        headers: { 'Auto-Submitted': 'auto-generated' },
        disableFileAccess: true,
        disableUrlAccess: true,
        signal: AbortSignal.timeout(config.patienceMs),
      });
    },
    close() {
      transport.close();
    },
  };
}
