import { asc, eq } from 'drizzle-orm';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { dutiesTable } from '#server/db/tables/calibration.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { digestsTable, notificationsTable } from '#server/db/tables/notification.table.ts';
import { outboxTable } from '#server/db/tables/outbox.table.ts';
import { grantsTable, personsTable } from '#server/db/tables/person.table.ts';
import { settingsTable } from '#server/db/tables/setting.table.ts';
import {
  DigestHeldError,
  resumeReminderDigests,
  sendReminderDigest,
} from '#server/features/reminders/send-digest.service.ts';
import { sweepDueReminders } from '#server/features/reminders/sweep-reminders.service.ts';
import { PoisonJobError } from '#server/jobs/job-queue.ts';
import { buildDuty, buildMailPerson } from '#tests/support/build-duties.ts';
import { buildSite } from '#tests/support/build-site.ts';
import { startInbox } from '#tests/support/mail-inbox.ts';
import type { Inbox } from '#tests/support/mail-inbox.ts';
import { createWorkerBench, eventually } from '#tests/support/worker-bench.ts';
import type { WorkerBench } from '#tests/support/worker-bench.ts';

let inbox: Inbox;
let bench: WorkerBench;
let siteId: number;
beforeAll(async () => {
  inbox = await startInbox();
});
afterAll(() => inbox.close());
beforeEach(async () => {
  await inbox.clear();
  bench = await createWorkerBench({ SMTP_URL: inbox.smtpUrl });
  ({ id: siteId } = await buildSite(bench.db, { code: 'larkfen', name: 'Larkfen' }));
});
afterEach(() => bench.drop());

const sweep = () => sweepDueReminders(bench.deps, siteId);
const digests = () => bench.db.select().from(digestsTable).orderBy(asc(digestsTable.id));
const notifications = () =>
  bench.db.select().from(notificationsTable).orderBy(asc(notificationsTable.id));
const queued = async () =>
  (await bench.db.select().from(outboxTable).orderBy(asc(outboxTable.id))).map(
    (row) => row.payload,
  );
/** Sends all that waits, as the worker does. */
async function sendAll(): Promise<void> {
  for (const { id } of await digests()) {
    await sendReminderDigest(bench.deps, id);
  }
}
async function lastDigestId(): Promise<number> {
  return (await digests()).at(-1)?.id ?? 0;
}

describe('the sweep', () => {
  test('writes one digest for each metrologist and custodian, with what concerns them', async () => {
    const custodian = await buildMailPerson(bench.db, siteId, { role: 'engineer' });
    const here = await buildMailPerson(bench.db, siteId);
    const everywhere = await buildMailPerson(bench.db, siteId, { everywhere: true });
    await buildMailPerson(bench.db, siteId, { role: 'engineer' });
    const own = await buildDuty(bench.db, siteId, {
      dueOn: '2026-03-09',
      custodianId: custodian.id,
    });
    const other = await buildDuty(bench.db, siteId, { dueOn: '2026-02-21' });
    await buildDuty(bench.db, siteId, { dueOn: '2026-04-02' });
    await buildDuty(bench.db, siteId, { dueOn: null });

    expect(await sweep()).toEqual({ kind: 'swept', day: '2026-03-02', digestCount: 3 });

    const rows = await notifications();
    const of = (personId: number) =>
      rows
        .filter((row) => row.personId === personId)
        .map(({ dutyId, dueOn, reason }) => [dutyId, dueOn, reason]);
    const both = [
      [own.id, '2026-03-09', 'lead-7'],
      [other.id, '2026-02-21', 'overdue-1'],
    ];
    expect(of(custodian.id)).toEqual(both.slice(0, 1));
    expect(of(here.id)).toEqual(both);
    expect(of(everywhere.id)).toEqual(both);
    expect(rows).toHaveLength(5);
    const ids = (await digests()).map((digest) => digest.id);
    expect(await queued()).toEqual(ids.map((digestId) => ({ digestId, round: 0 })));
  });

  test('a duty without its own custodian is the one of who keeps the instrument', async () => {
    const keeper = await buildMailPerson(bench.db, siteId, { role: null });
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-02', instrumentCustodianId: keeper.id });
    await sweep();
    expect(await notifications()).toMatchObject([{ personId: keeper.id, reason: 'due' }]);
  });

  test('twice on a day, even at once, says nothing twice', async () => {
    await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    await Promise.all([sweep(), sweep(), sweep()]);
    await sweep();
    expect(await digests()).toHaveLength(1);
    expect(await notifications()).toHaveLength(1);
    expect(await queued()).toHaveLength(1);
  });

  test('day after day gives each reason once', async () => {
    await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    for (let day = 0; day < 18; day += 1) {
      await sweep();
      await sendAll();
      bench.clock.advance({ hours: 24 });
    }
    expect((await notifications()).map((row) => row.reason)).toEqual([
      'lead-7',
      'lead-1',
      'due',
      'overdue-1',
    ]);
    expect(await inbox.mails()).toHaveLength(4);
  });

  test('after a time without reminders only the nearest reason is given', async () => {
    await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    await sweep();
    bench.clock.advance({ hours: 24 * 30 });
    await sweep();
    expect((await notifications()).map((row) => row.reason)).toEqual(['lead-7', 'overdue-3']);
  });

  test('a new due day begins anew', async () => {
    await buildMailPerson(bench.db, siteId);
    const duty = await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    await sweep();
    await bench.db
      .update(dutiesTable)
      .set({ nextDueOn: '2026-03-10' })
      .where(eq(dutiesTable.id, duty.id));
    bench.clock.advance({ hours: 24 });
    await sweep();
    expect((await notifications()).map((row) => [row.dueOn, row.reason])).toEqual([
      ['2026-03-09', 'lead-7'],
      ['2026-03-10', 'lead-7'],
    ]);
  });

  test('keeps the lead times of the site', async () => {
    await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-05-31' });
    const at = bench.clock.now();
    await bench.db.insert(settingsTable).values({
      siteId,
      key: 'reminderLeadDays',
      value: [90, 10],
      createdAt: at,
      updatedAt: at,
    });
    await sweep();
    expect(await notifications()).toMatchObject([{ reason: 'lead-90' }]);
  });

  test('does nothing before six on the clock of the site, and goes by its day', async () => {
    const toronto = await buildSite(bench.db, { code: 'otterholm', zone: 'America/Toronto' });
    await buildMailPerson(bench.db, toronto.id);
    await buildDuty(bench.db, toronto.id, { dueOn: '2026-03-09' });
    bench.clock.set('2026-03-08T09:58:00Z');
    const early = await sweepDueReminders(bench.deps, toronto.id);
    bench.clock.set('2026-03-08T10:00:00Z');
    const onTime = await sweepDueReminders(bench.deps, toronto.id);
    bench.clock.set('2026-03-09T02:00:00Z');
    const evening = await sweepDueReminders(bench.deps, toronto.id);

    expect(early).toEqual({ kind: 'too-early' });
    expect(onTime).toEqual({ kind: 'swept', day: '2026-03-08', digestCount: 1 });
    expect(evening).toEqual({ kind: 'swept', day: '2026-03-08', digestCount: 0 });
    expect(await notifications()).toMatchObject([{ reason: 'lead-1' }]);
  });

  test('passes over ended duties, retired instruments, other sites, barred people and those without mail', async () => {
    const at = bench.clock.now();
    const other = await buildSite(bench.db, { code: 'otterholm' });
    await buildMailPerson(bench.db, other.id);
    await buildMailPerson(bench.db, siteId, { email: null });
    const barred = await buildMailPerson(bench.db, siteId);
    await bench.db.update(personsTable).set({ barredAt: at }).where(eq(personsTable.id, barred.id));
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09', custodianId: barred.id });
    expect(await sweep()).toMatchObject({ digestCount: 0 });

    await buildMailPerson(bench.db, siteId);
    const ended = await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    await bench.db.update(dutiesTable).set({ endedAt: at }).where(eq(dutiesTable.id, ended.id));
    const retired = await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    await bench.db
      .update(instrumentsTable)
      .set({ state: 'retired' })
      .where(eq(instrumentsTable.id, retired.instrumentId));
    await buildDuty(bench.db, other.id, { dueOn: '2026-03-09' });
    await sweep();
    expect(await notifications()).toHaveLength(1);
  });

  test('of a site that is gone is poison', async () => {
    await expect(sweepDueReminders(bench.deps, 999)).rejects.toThrow(PoisonJobError);
  });
});

describe('the digest', () => {
  test('goes out as plain text and HTML, under the Message-ID of its row', async () => {
    const person = await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-02-21', tag: 'K01', model: 'A<b> & "c"' });
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-03', tag: 'M07' });
    await sweep();
    await sendAll();

    const [mail, ...more] = await inbox.mails();
    const [digest] = await digests();
    expect(more).toEqual([]);
    expect(mail).toMatchObject({
      to: [person.email],
      from: 'millpond@example.org',
      subject: 'Larkfen: 1 overdue, 1 falling due',
      messageId: digest?.messageId,
    });
    expect(mail?.messageId).toMatch(
      /^<reminders\.larkfen\.2026-03-02\.\d+\.[0-9a-f]{16}@example\.org>$/,
    );
    expect(mail?.text).toContain(
      'K01, A<b> & "c"\n  Calibration, due 21 Feb 2026, 9 days ago\n  http://127.0.0.1:4300/larkfen/equipment/K01',
    );
    expect(mail?.text).toContain('Calibration, due 3 Mar 2026, tomorrow');
    expect(mail?.html).toContain('K01, A&lt;b&gt; &amp; &quot;c&quot;</a>');
    expect(mail?.headers).toContainEqual({ name: 'auto-submitted', value: 'auto-generated' });
    expect(digest).toMatchObject({ state: 'sent', sentAt: bench.clock.now(), attempts: 1 });
  });

  test('sent twice goes out once, also when two send at once', async () => {
    await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    await sweep();
    const id = await lastDigestId();
    await inbox.next({ kind: 'late', milliseconds: 300 });
    const outcomes = await Promise.allSettled([
      sendReminderDigest(bench.deps, id),
      sendReminderDigest(bench.deps, id),
    ]);
    expect(outcomes.find((outcome) => outcome.status === 'fulfilled')).toMatchObject({
      value: 'sent',
    });
    expect(outcomes.find((outcome) => outcome.status === 'rejected')?.reason).toBeInstanceOf(
      DigestHeldError,
    );
    expect(await sendReminderDigest(bench.deps, id)).toBe('settled');
    expect(await inbox.mails()).toHaveLength(1);
  });

  test('refused by the mail server it waits, and goes out with the next try', async () => {
    await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    await sweep();
    const id = await lastDigestId();
    await inbox.next({ kind: 'fail', code: 451, message: 'try again later' });
    await expect(sendReminderDigest(bench.deps, id)).rejects.toThrow('451');
    expect(await digests()).toMatchObject([{ state: 'waiting', attempts: 1, sentAt: null }]);

    expect(await sendReminderDigest(bench.deps, id)).toBe('sent');
    expect(await inbox.mails()).toHaveLength(1);
  });

  test('taken by a server that then breaks off, it comes again under the same Message-ID', async () => {
    await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    await sweep();
    const id = await lastDigestId();
    await inbox.next({ kind: 'afterAccept' });
    await expect(sendReminderDigest(bench.deps, id)).rejects.toThrow();
    await sendReminderDigest(bench.deps, id);

    const ids = (await inbox.mails()).map((mail) => mail.messageId);
    expect(ids).toHaveLength(2);
    expect(new Set(ids).size).toBe(1);
  });

  test('a server that stalls is given up after the configured patience', async () => {
    await bench.drop();
    bench = await createWorkerBench({ SMTP_URL: inbox.smtpUrl, MAIL_PATIENCE_S: '0.5' });
    ({ id: siteId } = await buildSite(bench.db));
    await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    await sweep();
    await inbox.next({ kind: 'late', milliseconds: 1500 });
    const id = await lastDigestId();
    await expect(sendReminderDigest(bench.deps, id)).rejects.toThrow();
    expect(await digests()).toMatchObject([{ state: 'waiting', attempts: 1 }]);

    // The stand-in had the whole mail and takes it in the end: the next try repeats it.
    await eventually('the stalled mail', async () => (await inbox.mails())[0]);
    await sendReminderDigest(bench.deps, id);
    expect(new Set((await inbox.mails()).map((mail) => mail.messageId)).size).toBe(1);
  });

  test('is read afresh: what was done meanwhile is left out, and nothing left is not sent', async () => {
    const person = await buildMailPerson(bench.db, siteId);
    const done = await buildDuty(bench.db, siteId, { dueOn: '2026-03-09', tag: 'M01' });
    const open = await buildDuty(bench.db, siteId, { dueOn: '2026-03-09', tag: 'M02' });
    await sweep();
    const move = (id: number) =>
      bench.db.update(dutiesTable).set({ nextDueOn: '2027-03-09' }).where(eq(dutiesTable.id, id));
    await move(done.id);
    await sendAll();
    const [mail] = await inbox.mails();
    expect(mail?.to).toEqual([person.email]);
    expect(mail?.text).toContain('M02');
    expect(mail?.text).not.toContain('M01');

    await inbox.clear();
    bench.clock.advance({ hours: 24 * 6 });
    await sweep();
    await move(open.id);
    expect(await sendReminderDigest(bench.deps, await lastDigestId())).toBe('dropped');
    expect(await inbox.mails()).toEqual([]);
  });

  test('does not reach who lost the role, the mail or the access since the sweep', async () => {
    const demoted = await buildMailPerson(bench.db, siteId);
    const barred = await buildMailPerson(bench.db, siteId);
    const mute = await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    await sweep();
    await bench.db.delete(grantsTable).where(eq(grantsTable.personId, demoted.id));
    const at = bench.clock.now();
    await bench.db.update(personsTable).set({ barredAt: at }).where(eq(personsTable.id, barred.id));
    await bench.db.update(personsTable).set({ email: null }).where(eq(personsTable.id, mute.id));
    await sendAll();
    expect(await inbox.mails()).toEqual([]);
    expect((await digests()).map((digest) => digest.state)).toEqual(Array(3).fill('dropped'));
  });

  test('dropped told nobody, so the reason is given again when it can be', async () => {
    const person = await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    await sweep();
    await bench.db.update(personsTable).set({ email: null }).where(eq(personsTable.id, person.id));
    await sendAll();
    await bench.db
      .update(personsTable)
      .set({ email: person.email })
      .where(eq(personsTable.id, person.id));
    bench.clock.advance({ hours: 24 });
    await sweep();
    await sendAll();
    expect(await notifications()).toMatchObject([{ reason: 'lead-7' }]);
    expect(await inbox.mails()).toMatchObject([{ to: [person.email] }]);
  });

  test('that was tried once takes nothing more in; it comes the next morning', async () => {
    await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09', tag: 'M01' });
    await sweep();
    await inbox.next({ kind: 'afterAccept' });
    await expect(sendReminderDigest(bench.deps, await lastDigestId())).rejects.toThrow();
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09', tag: 'M02' });
    await sweep();
    await sendAll();
    const sameDay = await inbox.mails();
    bench.clock.advance({ hours: 24 });
    await sweep();
    await sendAll();
    const texts = (await inbox.mails()).map((mail) => mail.text);
    expect(sameDay.map((mail) => mail.text.includes('M02'))).toEqual([false, false]);
    expect(texts.at(-1)).toContain('M02');
    expect(texts.at(-1)).not.toContain('M01');
  });

  test('that does not exist is poison', async () => {
    await expect(sendReminderDigest(bench.deps, 999)).rejects.toThrow(PoisonJobError);
  });
});

describe('what was left behind', () => {
  beforeEach(async () => {
    await buildMailPerson(bench.db, siteId);
    await buildDuty(bench.db, siteId, { dueOn: '2026-03-09' });
    await sweep();
    await bench.db.delete(outboxTable);
  });

  test('is queued again when its job is lost, and no sooner than five minutes later', async () => {
    bench.clock.advance({ minutes: 4 });
    expect(await resumeReminderDigests(bench.deps)).toBe(0);
    bench.clock.advance({ minutes: 1 });
    expect(await resumeReminderDigests(bench.deps)).toBe(1);
    expect(await queued()).toEqual([
      { digestId: await lastDigestId(), round: Date.parse('2026-03-02T08:05:00Z') / 300_000 },
    ]);
  });

  test('is queued again when the lease of a dead sender has run out', async () => {
    const id = await lastDigestId();
    await bench.db
      .update(digestsTable)
      .set({ state: 'sending', leaseUntil: new Date('2026-03-02T08:01:00Z') })
      .where(eq(digestsTable.id, id));
    await expect(sendReminderDigest(bench.deps, id)).rejects.toThrow(DigestHeldError);
    expect(await resumeReminderDigests(bench.deps)).toBe(0);
    bench.clock.advance({ minutes: 1 });
    expect(await resumeReminderDigests(bench.deps)).toBe(1);
    expect(await sendReminderDigest(bench.deps, id)).toBe('sent');
  });

  test('rests longer the more often it failed, up to six hours', async () => {
    const id = await lastDigestId();
    const triedAt = bench.clock.now();
    async function restsFor(attempts: number): Promise<number> {
      await bench.db
        .update(digestsTable)
        .set({ attempts, leaseUntil: triedAt })
        .where(eq(digestsTable.id, id));
      bench.clock.set(triedAt.toISOString());
      for (let minutes = 0; ; minutes += 5) {
        if ((await resumeReminderDigests(bench.deps)) === 1) {
          return minutes;
        }
        bench.clock.advance({ minutes: 5 });
      }
    }
    expect([await restsFor(1), await restsFor(5), await restsFor(12)]).toEqual([5, 10, 20]);
    expect(await restsFor(100_000)).toBe(360);
  });
});
