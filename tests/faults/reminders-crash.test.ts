import { DateTime } from 'luxon';
import { setTimeout as pause } from 'node:timers/promises';
import { asc } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { connectDatabase } from '#server/db/client.ts';
import type { Database } from '#server/db/client.ts';
import { digestsTable } from '#server/db/tables/notification.table.ts';
import { buildDuty, buildMailPerson } from '#tests/support/build-duties.ts';
import { buildSite } from '#tests/support/build-site.ts';
import { startInbox } from '#tests/support/mail-inbox.ts';
import type { Inbox } from '#tests/support/mail-inbox.ts';
import { seededRandom } from '#tests/support/seeded-random.ts';
import { testEnvironment } from '#tests/support/test-config.ts';
import { createTestDatabase } from '#tests/support/test-database.ts';
import type { TestDatabase } from '#tests/support/test-database.ts';
import { eventually } from '#tests/support/worker-bench.ts';
import { startWorkerProcess } from '#tests/support/worker-process.ts';
import type { WorkerProcess } from '#tests/support/worker-process.ts';

const peopleCount = 40;
const killCount = 6;
/** As many mails as the worker has under way at once. */
const underWay = 4;

let home: TestDatabase;
let database: Database;
let inbox: Inbox;
beforeAll(async () => {
  home = await createTestDatabase();
  database = connectDatabase({ url: home.url, maxConnections: 2 });
  inbox = await startInbox();
});
afterAll(async () => {
  await inbox.close();
  await database.close();
  await home.drop();
});

/** A zone in which it is noon now, so that the worker, which goes by the real time, finds a morning past. */
function zoneWithNoon(): string {
  const behind = new Date().getUTCHours() - 12;
  return `Etc/GMT${behind >= 0 ? '+' : '-'}${Math.abs(behind)}`;
}

function startOne(): WorkerProcess {
  return startWorkerProcess(
    testEnvironment({
      NODE_ENV: 'production',
      DATABASE_URL: home.url,
      SMTP_URL: inbox.smtpUrl,
      MAIL_PATIENCE_S: '2',
      JOB_LOCK_S: '1',
      LOG_LEVEL: 'info',
    }),
  );
}

const digests = () => database.db.select().from(digestsTable).orderBy(asc(digestsTable.id));

test('of digests whose worker is killed over and over none is lost, and a repeat is the same mail', async () => {
  const zone = zoneWithNoon();
  const site = await buildSite(database.db, { zone });
  for (let count = 0; count < peopleCount; count += 1) {
    await buildMailPerson(database.db, site.id);
  }
  const today = DateTime.now().setZone(zone).toISODate();
  await buildDuty(database.db, site.id, { dueOn: today });
  const random = seededRandom(20260302);
  const arrived = async () => (await inbox.mails()).length;
  /** For each digest, how often a worker died while it was under way. */
  const cutOff = new Map<number, number>();
  const attempts = new Map<number, number>();
  const settledBefore: { readonly messageId: string; readonly copies: number }[] = [];

  for (let kill = 1; kill <= killCount; kill += 1) {
    const before = await arrived();
    const wanted = before + 1 + Math.floor(random() * 4);
    for (let mail = 0; mail < 6; mail += 1) {
      await inbox.next({ kind: 'late', milliseconds: Math.floor(random() * 120) });
    }
    const worker = startOne();
    await eventually(`mail ${wanted} before kill ${kill}: ${worker.output()}`, async () =>
      worker.isGone() || (await arrived()) >= wanted ? true : undefined,
    );
    expect(worker.isGone(), worker.output()).toBe(false);
    await pause(Math.floor(random() * 40));
    await worker.end('SIGKILL');

    const rows = await digests();
    // The stand-in may still be at what was handed to it whole.
    await pause(400);
    const mails = await inbox.mails();
    const isCutOff = (row: (typeof rows)[number]) =>
      row.state === 'sending' && row.attempts > (attempts.get(row.id) ?? 0);
    expect(rows.filter(isCutOff).length).toBeLessThanOrEqual(underWay);
    for (const row of rows) {
      if (isCutOff(row)) {
        cutOff.set(row.id, (cutOff.get(row.id) ?? 0) + 1);
      }
      attempts.set(row.id, row.attempts);
      if (row.state === 'sent') {
        const copies = mails.filter((mail) => mail.messageId === row.messageId).length;
        settledBefore.push({ messageId: row.messageId, copies });
      }
    }
  }
  expect((await digests()).some((row) => row.state !== 'sent')).toBe(true);

  const last = [startOne(), startOne()];
  const rows = await eventually(
    'every digest to be sent',
    async () => {
      const found = await digests();
      return found.every((row) => row.state === 'sent') ? found : undefined;
    },
    120,
  );
  const codes = await Promise.all(last.map((worker) => worker.end('SIGTERM')));
  const mails = await inbox.mails();
  const copiesOf = (messageId: string) =>
    mails.filter((mail) => mail.messageId === messageId).length;

  expect(codes).toEqual([0, 0]);
  expect(rows).toHaveLength(peopleCount);
  expect(new Set(mails.map((mail) => mail.to[0])).size).toBe(peopleCount);
  expect(new Set(mails.map((mail) => mail.messageId)).size).toBe(peopleCount);
  for (const row of rows) {
    expect(copiesOf(row.messageId)).toBeGreaterThanOrEqual(1);
    expect(copiesOf(row.messageId)).toBeLessThanOrEqual(1 + (cutOff.get(row.id) ?? 0));
  }
  for (const { messageId, copies } of settledBefore) {
    expect(copiesOf(messageId)).toBe(copies);
  }
}, 300_000);
