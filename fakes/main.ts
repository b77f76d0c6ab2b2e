/** Runs the stand-ins the launcher asks for, until it is told to stop. */
import { loadStandInSettings } from './config.ts';
import { start as startIdentity } from './identity/server.ts';
import { start as startMail } from './mail/server.ts';

const settings = loadStandInSettings();
const running: { close: () => Promise<void> }[] = [];
if (settings.identity !== null) {
  const identity = await startIdentity(settings.identity);
  running.push(identity);
  process.stdout.write(`identity stand-in at ${identity.url}\n`);
}
if (settings.mail !== null) {
  const mail = await startMail(settings.mail);
  running.push(mail);
  process.stdout.write(`mail stand-in at ${mail.url}, SMTP at ${mail.smtpUrl}\n`);
}

async function stop(): Promise<void> {
  for (const standIn of running.splice(0)) {
    await standIn.close();
  }
  process.exit(0);
}
process.on('SIGTERM', () => void stop());
process.on('SIGINT', () => void stop());
