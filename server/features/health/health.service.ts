import type { z } from 'zod';
import type { Deps } from '#server/deps.ts';
import type { getHealth as contract } from '#shared/contracts/health.contract.ts';
import { getBacklog } from './health.repository.ts';

export async function getHealth(
  deps: Pick<Deps, 'clock' | 'db'>,
): Promise<z.output<typeof contract.response>> {
  const { outboxWaiting, outboxOldestAt, auditUnsealed } = await getBacklog(deps.db);
  const now = deps.clock.now();
  const ageMs = outboxOldestAt === null ? 0 : now.getTime() - outboxOldestAt.getTime();
  return {
    isReady: true,
    now: now.toISOString(),
    outboxWaiting,
    outboxOldestS: Math.max(0, Math.floor(ageMs / 1000)),
    auditUnsealed,
  };
}
