import { createServer } from 'node:http';
import { createApp } from './app.ts';
import { ConfigError, loadProcessConfig } from './config.ts';
import { buildDeps } from './deps.ts';
import { createSessionStore } from './http/sessions.ts';

const drainMs = 10_000;

function start(): void {
  const config = loadProcessConfig();
  const { deps, database, close } = buildDeps(config);
  const sessionStore = createSessionStore(database.pool, deps.log);
  const server = createServer(createApp({ deps, sessionStore }));
  server.on('error', (error) => {
    deps.log.fatal({ err: error }, 'the server cannot listen');
    process.exit(1);
  });
  server.listen(config.port, config.host, () => {
    deps.log.info({ address: server.address() }, 'listening');
  });

  let isStopping = false;
  async function stop(): Promise<void> {
    if (isStopping) {
      return;
    }
    isStopping = true;
    const force = setTimeout(() => {
      server.closeAllConnections();
    }, drainMs);
    await new Promise<void>((resolve) => {
      server.close(() => {
        resolve();
      });
      server.closeIdleConnections();
    });
    clearTimeout(force);
    sessionStore.close();
    await close();
    deps.log.info('stopped');
  }
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    process.on(signal, () => void stop());
  }
}

try {
  start();
} catch (error) {
  if (!(error instanceof ConfigError)) {
    throw error;
  }
  process.stderr.write(`${error.message}\n`);
  process.exitCode = 1;
}
