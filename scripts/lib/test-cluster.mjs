import { chmodSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { randomBytes } from 'node:crypto';
import { temporaryFolder } from './check-steps.mjs';
import { ensurePostgres } from './packages.mjs';
import * as postgres from './postgres.mjs';
import { clusterFolder, keepPorts, prepareState } from './state.mjs';

/** A cluster that lives as long as one run: no fsync, many connections, nothing kept. */
export async function startTestCluster(name) {
  const bin = await ensurePostgres();
  const folder = temporaryFolder(name);
  chmodSync(folder, 0o755);
  prepareState(folder);
  const ports = await keepPorts(folder);
  const cluster = { bin, folder: await clusterFolder(folder), port: ports.database };
  const adminPassword = randomBytes(18).toString('hex');
  await postgres.ensureCluster({ ...cluster, adminPassword });
  await postgres.startCluster({
    ...cluster,
    options: [
      '-c fsync=off',
      '-c synchronous_commit=off',
      '-c full_page_writes=off',
      '-c max_connections=300',
      '-c shared_buffers=256MB',
    ],
  });
  return {
    adminUrl: postgres.databaseUrl({
      port: ports.database,
      role: postgres.adminRole,
      password: adminPassword,
      database: 'postgres',
    }),
    folder,
    stop: async () => {
      await postgres.stopCluster(cluster);
      rmSync(join(cluster.folder), { recursive: true, force: true });
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
