import { z } from 'zod';
import { start } from '#fakes/mail/server.ts';

const mailSchema = z.object({
  id: z.number(),
  messageId: z.string(),
  from: z.string(),
  to: z.array(z.string()),
  subject: z.string(),
  text: z.string(),
  html: z.string().nullable(),
  headers: z.array(z.object({ name: z.string(), value: z.string() })),
});
export type Mail = z.infer<typeof mailSchema>;
export type Inbox = Awaited<ReturnType<typeof startInbox>>;

/** The mail stand-in on free ports, with its control calls. */
export async function startInbox() {
  const standIn = await start({ smtpPort: 0, httpPort: 0, folder: null });
  return {
    smtpUrl: standIn.smtpUrl,
    /** Oldest first. */
    async mails(): Promise<Mail[]> {
      const response = await fetch(`${standIn.url}/__calls`);
      return z
        .array(mailSchema)
        .parse(await response.json())
        .reverse();
    },
    async next(what: Readonly<Record<string, unknown>>): Promise<void> {
      const response = await fetch(`${standIn.url}/__next`, {
        method: 'POST',
        body: JSON.stringify(what),
      });
      if (!response.ok) {
        throw new Error(`The stand-in does not take ${JSON.stringify(what)}.`);
      }
    },
    async clear(): Promise<void> {
      await fetch(`${standIn.url}/__calls`, { method: 'DELETE' });
    },
    close: () => standIn.close(),
  };
}
