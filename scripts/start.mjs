import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureClient } from './lib/build.mjs';
import { print, runMain, say } from './lib/say.mjs';
import { keepRunning, startServices } from './lib/services.mjs';

const root = dirname(dirname(fileURLToPath(import.meta.url)));

function describe({ plan, people, environment, ports, folder }) {
  print();
  print(`  Millpond is ready:  ${environment.publicUrl}`);
  print();
  if (plan.ownsIdentity) {
    print('  Demo people (one click each on the sign-in page; no passwords, nothing is real):');
    for (const person of people) {
      const where = person.site === undefined ? 'every site' : person.site;
      print(
        `    ${person.name.padEnd(13)} ${person.role.padEnd(15)} ${where.padEnd(11)} ${person.note}`,
      );
    }
    print();
  }
  if (plan.ownsMail) {
    print(`  What Millpond mails appears at http://127.0.0.1:${ports.mail}`);
  }
  print(`  Logs are in ${folder}/logs. Ctrl-C stops everything; the data stay.`);
  print();
}

await runMain(() =>
  keepRunning(async (life) => {
    const started = await startServices(root, { ...life, prepare: () => ensureClient(root) });
    say('ready');
    describe(started);
  }),
);
process.exit(process.exitCode ?? 0);
