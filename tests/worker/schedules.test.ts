import { DateTime } from 'luxon';
import { afterAll, afterEach, beforeAll, beforeEach, expect, test } from 'vitest';
import { z } from 'zod';
import type { SiteScope } from '#server/actor.ts';
import { openBullmqBackend } from '#server/jobs/bullmq-backend.ts';
import { createBullmqJobQueue } from '#server/jobs/bullmq-job-queue.ts';
import { planSchedules } from '#worker/plan-schedules.ts';
import { startWorker } from '#worker/start-worker.ts';
import type { RunningWorker } from '#worker/start-worker.ts';
import { buildDuty, buildMailPerson } from '#tests/support/build-duties.ts';
import { buildSite } from '#tests/support/build-site.ts';
import { startInbox } from '#tests/support/mail-inbox.ts';
import type { Inbox } from '#tests/support/mail-inbox.ts';
import { createWorkerBench, eventually } from '#tests/support/worker-bench.ts';
import type { WorkerBench } from '#tests/support/worker-bench.ts';

let inbox: Inbox;
let bench: WorkerBench;
let worker: RunningWorker | undefined;
beforeAll(async () => {
  inbox = await startInbox();
});
afterAll(() => inbox.close());
beforeEach(async () => {
  await inbox.clear();
  bench = await createWorkerBench({ SMTP_URL: inbox.smtpUrl });
});
afterEach(async () => {
  await worker?.stop();
  worker = undefined;
  await bench.drop();
});

const larkfen: SiteScope = { id: 1, code: 'larkfen', name: 'Larkfen', zone: 'Europe/Dublin' };
const otterholm: SiteScope = {
  id: 2,
  code: 'otterholm',
  name: 'Otterholm',
  zone: 'America/Toronto',
};
const hasLine = (msg: string) => (bench.lines.some((line) => line.msg === msg) ? true : undefined);

test('each site has its sweep at six on its own clock, and a site that is gone has none', async () => {
  const backend = openBullmqBackend({
    databaseUrl: bench.config.database.url,
    redisUrl: null,
    onConnectionError: () => undefined,
  });
  const queue = createBullmqJobQueue(backend, () => undefined);
  const { queue: reader, end } = backend.openQueue();
  const sweeps = async () =>
    (await reader.getJobSchedulers(0, -1))
      .filter((schedule) => schedule.name === 'sweep-due-reminders')
      .map(({ key, tz, next, template }) => ({
        key,
        data: z.unknown().parse(template?.data),
        clock: DateTime.fromMillis(next ?? 0, { zone: tz ?? 'utc' }).toFormat('HH:mm:ss'),
        tz,
      }))
      .sort((a, b) => a.key.localeCompare(b.key));

  await queue.plan(planSchedules([larkfen, otterholm]));
  const both = await sweeps();
  await queue.plan(planSchedules([{ ...larkfen, zone: 'Asia/Kathmandu' }]));
  const moved = await sweeps();
  const others = (await reader.getJobSchedulers(0, -1)).map((schedule) => schedule.key).sort();
  await queue.close();
  await reader.close();
  await end();

  const of = (site: SiteScope, tz: string) => ({
    key: `sweep-due-reminders-${site.code}`,
    data: { payload: { siteId: site.id }, requestId: null },
    clock: '06:00:00',
    tz,
  });
  expect(both).toEqual([of(larkfen, 'Europe/Dublin'), of(otterholm, 'America/Toronto')]);
  expect(moved).toEqual([of(larkfen, 'Asia/Kathmandu')]);
  expect(others).toEqual([
    'prune-outbox',
    'resume-reminder-digests',
    'sweep-due-reminders-larkfen',
  ]);
});

test('a worker that starts after six catches up, and a refused mail goes out with a later attempt', async () => {
  const site = await buildSite(bench.db);
  const person = await buildMailPerson(bench.db, site.id);
  await buildDuty(bench.db, site.id, { dueOn: '2026-03-09' });
  await inbox.next({ kind: 'fail', code: 451, message: 'try again later' });
  const { config, clock, log } = bench;
  worker = await startWorker(config, { clock, log });

  await eventually('the refusal', () => hasLine('job failed and will be tried again'));
  await eventually('the mail', async () => (await inbox.mails())[0]);
  await eventually('the end of the job', () => hasLine('digest sent'));
  expect(await inbox.mails()).toMatchObject([{ to: [person.email] }]);
});

test('a worker that starts before six leaves it to the morning', async () => {
  const site = await buildSite(bench.db);
  await buildMailPerson(bench.db, site.id);
  await buildDuty(bench.db, site.id, { dueOn: '2026-03-09' });
  bench.clock.set('2026-03-02T05:00:00Z');
  const { config, clock, log } = bench;
  worker = await startWorker(config, { clock, log });

  await eventually('the sweep', () => hasLine('reminders are not due before the morning'));
  expect(hasLine('reminders swept')).toBeUndefined();
  expect(await inbox.mails()).toEqual([]);
});
