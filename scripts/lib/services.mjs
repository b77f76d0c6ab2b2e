import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { Children } from './children.mjs';
import { ensureNodeModules, ensurePostgres, requireNode } from './packages.mjs';
import { childEnvironment, planServices } from './plan.mjs';
import * as postgres from './postgres.mjs';
import { run } from './run.mjs';
import { print, say } from './say.mjs';
import * as state from './state.mjs';

const typescript = ['--import', 'tsx'];

async function startDatabase({ folder, ports, secrets }) {
  const bin = await ensurePostgres();
  const cluster = { bin, folder: await state.clusterFolder(folder), port: ports.database };
  await postgres.ensureCluster({ ...cluster, adminPassword: secrets.databaseAdmin });
  if (!(await postgres.isClusterRunning(cluster))) {
    await state.requireFreePort(ports.database, 'database');
  }
  await postgres.startCluster(cluster);
  await postgres.ensureDatabase({ bin, port: ports.database, secrets });
  const address = (role, password) =>
    postgres.databaseUrl({ port: ports.database, role, password, database: 'millpond' });
  return {
    stop: () => postgres.stopCluster(cluster),
    app: address('millpond_app', secrets.databaseApp),
    owner: address('millpond_owner', secrets.databaseOwner),
  };
}

async function runTypescript(root, script, env, what, ...args) {
  const { stdout } = await run(process.execPath, [...typescript, script, ...args], {
    cwd: root,
    env,
    failure: (written) =>
      `${what}: ${written
        .split('\n')
        .filter((line) => !/^\s+at /.test(line))
        .slice(-2)
        .join(' ')}`,
  });
  return stdout.trim();
}

/** Checks, installs, starts and waits; gives back what is needed to say so and to stop it all. */
export async function startServices(root, options) {
  requireNode();
  const plan = planServices(process.env);
  const folder = state.stateFolder(root);
  state.prepareState(folder);
  const running = state.findRunning(folder);
  if (running !== null) {
    state.claimState(folder, running.url);
  }
  await ensureNodeModules(root);
  await options.prepare?.();
  const ports = await state.keepPorts(folder);
  const secrets = state.keepSecrets(folder);
  const release = state.claimState(folder, `http://127.0.0.1:${plan.apiPort ?? ports.api}`);
  const children = new Children(folder, options.onDeath);
  const parts = { database: null };
  const stop = async () => {
    await children.stopAll();
    await parts.database?.stop();
    release();
  };
  options.onStarted(stop);

  if (plan.ownsDatabase) {
    say('starting the database');
    parts.database = await startDatabase({ folder, ports, secrets });
  }
  const people = JSON.parse(
    await runTypescript(
      root,
      'fakes/identity/print-people.ts',
      process.env,
      'The demo people could not be read',
    ),
  );
  const environment = childEnvironment({
    env: process.env,
    plan,
    ports,
    secrets,
    folder,
    people,
    addresses: parts.database ?? {
      app: process.env.DATABASE_URL,
      owner: process.env.DATABASE_OWNER_URL,
    },
  });
  say(
    await runTypescript(
      root,
      'server/cli/migrate.ts',
      environment.owner,
      'The database could not be migrated',
    ),
  );
  if (plan.loadsDemo) {
    const loaded = await runTypescript(
      root,
      'server/cli/load-demo.ts',
      environment.owner,
      'The demo could not be loaded',
      '--if-empty',
    );
    if (loaded !== '') {
      say(loaded);
    }
  }

  if (plan.ownsIdentity || plan.ownsMail) {
    if (plan.ownsIdentity) {
      await state.requireFreePort(ports.identity, 'sign-in stand-in');
    }
    if (plan.ownsMail) {
      await state.requireFreePort(ports.smtp, 'mail stand-in');
      await state.requireFreePort(ports.mail, 'mail stand-in');
    }
    say('starting the stand-ins');
    const standIns = children.start(
      'stand-ins',
      [...typescript, 'fakes/main.ts'],
      environment.standIns,
      { cwd: root },
    );
    if (plan.ownsIdentity) {
      await children.answers(
        standIns,
        `http://127.0.0.1:${ports.identity}/.well-known/openid-configuration`,
      );
    }
    if (plan.ownsMail) {
      await children.answers(standIns, `http://127.0.0.1:${ports.mail}/`);
    }
  }
  await state.requireFreePort(environment.apiPort, 'pages', 'PORT');
  say('starting the server and the worker');
  const server = children.start('server', [...typescript, 'server/main.ts'], environment.shared, {
    cwd: root,
  });
  if (existsSync(join(root, 'worker/main.ts'))) {
    children.start('worker', [...typescript, 'worker/main.ts'], environment.shared, { cwd: root });
  }
  await children.answers(server, `http://127.0.0.1:${environment.apiPort}/api/health`);
  return { plan, ports, folder, people, environment, children };
}

/** Runs until Ctrl-C or until a part dies, then stops everything in order. */
export function keepRunning(start) {
  return new Promise((resolve, reject) => {
    let stop = async () => undefined;
    let isEnding = false;
    async function end(error) {
      if (isEnding) {
        return;
      }
      isEnding = true;
      print();
      say('stopping');
      await stop();
      say('stopped');
      if (error === undefined) {
        resolve();
      } else {
        reject(error);
      }
    }
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
      process.on(signal, () => void end().catch(reject));
    }
    start({
      onStarted: (stopAll) => {
        stop = stopAll;
      },
      onDeath: (error) => void end(error).catch(reject),
    }).catch((error) => void end(error).catch(reject));
  });
}
