import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import { Children } from './lib/children.mjs';
import { ensureNodeModules, requireNode } from './lib/packages.mjs';
import { print, runMain } from './lib/say.mjs';
import { keepRunning } from './lib/services.mjs';
import { keepPorts, keepSecrets, prepareState, stateFolder } from './lib/state.mjs';

const root = dirname(dirname(fileURLToPath(import.meta.url)));

/** Only the stand-ins, for somebody who runs the server by hand. */
await runMain(() =>
  keepRunning(async (life) => {
    requireNode();
    await ensureNodeModules(root);
    const folder = stateFolder(root);
    prepareState(folder);
    const ports = await keepPorts(folder);
    const secrets = keepSecrets(folder);
    const children = new Children(folder, life.onDeath);
    life.onStarted(() => children.stopAll());
    const app = process.env.PUBLIC_URL ?? `http://127.0.0.1:${process.env.PORT ?? ports.api}`;
    const env = {
      ...process.env,
      OIDC_CLIENT_ID: process.env.OIDC_CLIENT_ID ?? 'millpond',
      OIDC_CLIENT_SECRET: process.env.OIDC_CLIENT_SECRET ?? secrets.oidcClient,
      STAND_IN_APP_URLS: app,
      STAND_IN_COOKIE_KEY: secrets.standInCookie,
      STAND_IN_IDENTITY_PORT: String(ports.identity),
      STAND_IN_SMTP_PORT: String(ports.smtp),
      STAND_IN_MAIL_PORT: String(ports.mail),
      STAND_IN_MAIL_FOLDER: `${folder}/mail`,
    };
    const entry = children.start('stand-ins', ['--import', 'tsx', 'fakes/main.ts'], env, {
      cwd: root,
    });
    await children.answers(entry, `http://127.0.0.1:${ports.mail}/`);
    print(`Sign-in stand-in: http://127.0.0.1:${ports.identity} (client millpond, for ${app})`);
    print(`Mail stand-in: smtp://127.0.0.1:${ports.smtp}, pages at http://127.0.0.1:${ports.mail}`);
  }),
);
process.exit(process.exitCode ?? 0);
