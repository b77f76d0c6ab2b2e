import { buildDeps } from '#server/deps.ts';
import type { Replacements } from '#server/deps.ts';
import type { Config } from '#server/config.ts';
import { listenTo } from '#server/db/listen.ts';
import { sealTrail } from '#server/features/audit/seal-trail.service.ts';
import { relayOutbox } from '#server/features/outbox/relay-outbox.service.ts';
import { listSites } from '#server/features/settings/settings.service.ts';
import { openBullmqBackend } from '#server/jobs/bullmq-backend.ts';
import { createBullmqJobQueue } from '#server/jobs/bullmq-job-queue.ts';
import { startBullmqWorker } from '#server/jobs/bullmq-job-worker.ts';
import { prepareJob } from '#server/jobs/define-job.ts';
import { sweepDueRemindersJob } from '#server/jobs/definitions/sweep-due-reminders.job.ts';
import { planSchedules } from './plan-schedules.ts';
import { repeat } from './repeat.ts';
import { runJob } from './run-job.ts';

const sweepMs = 3000;
/** New sites and changed zones reach the schedules within this time. */
const planMs = 15 * 60_000;
const outboxChannel = 'millpond_outbox';

export type RunningWorker = { stop(): Promise<void> };

/** Starts everything that works in the background; several workers may run at once. */
export async function startWorker(
  config: Config,
  replacements: Replacements = {},
): Promise<RunningWorker> {
  const { deps, close } = buildDeps(config, replacements);
  const { log } = deps;
  function warn(message: string): (error: unknown) => void {
    return (error) => {
      log.warn({ err: error }, message);
    };
  }
  const backend = openBullmqBackend({
    databaseUrl: config.database.url,
    redisUrl: config.redisUrl,
    onConnectionError: warn('connection to Redis lost'),
  });
  const queue = createBullmqJobQueue(backend, warn('the queue cannot be reached'));
  const jobs = await startBullmqWorker(backend, log, (job) => runJob(deps, job), {
    concurrency: 4,
    lockMs: config.jobs.lockMs,
  });
  let isCaughtUp = false;
  const plan = repeat({
    everyMs: planMs,
    run: async () => {
      const sites = await listSites(deps);
      await queue.plan(planSchedules(sites));
      if (!isCaughtUp) {
        // Planning moves a sweep that was missed to its next morning; this one is for today.
        await queue.add(
          sites.map(({ id }) => prepareJob(sweepDueRemindersJob, { siteId: id }, null)),
        );
        isCaughtUp = true;
      }
    },
    onError: warn('the schedules could not be planned'),
  });
  const relay = repeat({
    everyMs: sweepMs,
    run: () => relayOutbox(deps, queue),
    onError: warn('the outbox could not be relayed'),
  });
  const seal = repeat({
    everyMs: sweepMs,
    run: () => sealTrail(deps),
    onError: warn('the audit trail could not be sealed'),
  });
  const listening = listenTo({
    url: config.database.url,
    channel: outboxChannel,
    onNotice: () => {
      relay.wake();
    },
    onLost: warn('no longer woken by the outbox; it is still swept'),
  });
  log.info('working');

  return {
    async stop() {
      await Promise.all([listening.close(), relay.stop(), seal.stop(), plan.stop()]);
      await jobs.close(false);
      await queue.close();
      await close();
      log.info('stopped');
    },
  };
}
