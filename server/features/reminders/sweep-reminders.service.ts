import { randomBytes } from 'node:crypto';
import { DateTime } from 'luxon';
import type { SiteScope } from '#server/actor.ts';
import type { Tx } from '#server/db/client.ts';
import type { Deps } from '#server/deps.ts';
import { addToOutbox } from '#server/features/outbox/outbox.service.ts';
import { getSitePolicy } from '#server/features/settings/settings.service.ts';
import { sendReminderDigestJob } from '#server/jobs/definitions/send-reminder-digest.job.ts';
import { PoisonJobError } from '#server/jobs/job-queue.ts';
import { decideReason } from '#shared/domain/reminders/decide-reason.ts';
import { reminderDay } from '#shared/domain/reminders/reminder-day.ts';
import type { ReminderReason } from '#shared/domain/reminders/types.ts';
import {
  findReminderSite,
  insertNotifications,
  listDutiesDueBy,
  listRecipients,
  listTold,
} from './duties.repository.ts';
import type { DueDuty } from './duties.repository.ts';
import { openDigest } from './digests.repository.ts';

/** Wall-clock hour at the site from which on reminders go out. */
export const reminderHour = 6;
/** The queue wakes the sweep by its own clock, which may run a moment ahead of ours. */
const clockSlackMs = 60_000;

type Sweeping = Pick<Deps, 'clock' | 'config' | 'db' | 'log' | 'requestId' | 'transact'>;
type Reminder = Pick<DueDuty, 'dueOn'> & {
  readonly dutyId: number;
  readonly reason: ReminderReason;
};

export type SweepOutcome =
  | { readonly kind: 'too-early' }
  | { readonly kind: 'swept'; readonly day: string; readonly digestCount: number };

/**
 * Writes down who is to be reminded of what today, and one digest for each person, in one transaction
 * with the effects that send them. Run again on the same day it finds nothing new to say; what turns up
 * after a person's digest has gone out waits for the next morning.
 */
export async function sweepDueReminders(deps: Sweeping, siteId: number): Promise<SweepOutcome> {
  const site = await findReminderSite(deps.db, siteId);
  if (site === null) {
    throw new PoisonJobError(`There is no site ${siteId} whose reminders could be swept.`);
  }
  const day = reminderDay({
    zone: site.zone,
    atMs: deps.clock.now().getTime() + clockSlackMs,
    hour: reminderHour,
  });
  if (day === null) {
    deps.log.info({ site: site.code }, 'reminders are not due before the morning');
    return { kind: 'too-early' };
  }
  const { reminderLeadDays } = await getSitePolicy(deps, siteId);
  const digestCount = await deps.transact((tx) =>
    sweepDay(deps, tx, { site, day, leadDays: reminderLeadDays }),
  );
  deps.log.info({ site: site.code, day, digestCount }, 'reminders swept');
  return { kind: 'swept', day, digestCount };
}

async function sweepDay(
  deps: Sweeping,
  tx: Tx,
  { site, day, leadDays }: { site: SiteScope; day: string; leadDays: readonly number[] },
): Promise<number> {
  const horizon = DateTime.fromISO(day, { zone: 'utc' }).plus({ days: Math.max(0, ...leadDays) });
  const duties = await listDutiesDueBy(tx, site.id, horizon.toISODate() ?? day);
  const custodianIds = duties.flatMap((duty) => duty.custodianId ?? []);
  const people = await listRecipients(tx, site.id, [...new Set(custodianIds)]);
  const told = await listTold(
    tx,
    duties.map((duty) => duty.id),
  );
  const sent = new Map<string, string[]>();
  for (const row of told) {
    const key = keyOf(row.dutyId, row.dueOn, row.personId);
    sent.set(key, [...(sent.get(key) ?? []), row.reason]);
  }
  const newDigestIds: number[] = [];
  for (const person of people) {
    const own = duties.filter((duty) => person.isMetrologist || duty.custodianId === person.id);
    const reminders = own.flatMap((duty): Reminder[] => {
      const reason = decideReason({
        dueOn: duty.dueOn,
        today: day,
        leadDays,
        sent: sent.get(keyOf(duty.id, duty.dueOn, person.id)) ?? [],
      });
      return reason === null ? [] : [{ dutyId: duty.id, dueOn: duty.dueOn, reason }];
    });
    const digestId = await gather(deps, tx, { site, day, personId: person.id, reminders });
    if (digestId !== null) {
      newDigestIds.push(digestId);
    }
  }
  await addToOutbox(
    deps,
    tx,
    sendReminderDigestJob,
    newDigestIds.map((digestId) => ({ digestId, round: 0 })),
  );
  return newDigestIds.length;
}

function keyOf(dutyId: number, dueOn: string, personId: number): string {
  return `${dutyId} ${dueOn} ${personId}`;
}

/** Gives the digest where it is a new one. */
async function gather(
  deps: Sweeping,
  tx: Tx,
  {
    site,
    day,
    personId,
    reminders,
  }: { site: SiteScope; day: string; personId: number; reminders: readonly Reminder[] },
): Promise<number | null> {
  if (reminders.length === 0) {
    return null;
  }
  const createdAt = deps.clock.now();
  const digest = await openDigest(tx, {
    personId,
    siteId: site.id,
    day,
    messageId: makeMessageId(deps.config.mail.from, site.code, day, personId),
    createdAt,
  });
  // Once tried, it may have been read: what it says must not change under the same Message-ID.
  if (digest.state !== 'waiting' || digest.attempts > 0) {
    return null;
  }
  await insertNotifications(
    tx,
    reminders.map((reminder) => ({ ...reminder, personId, digestId: digest.id, createdAt })),
  );
  return digest.isNew ? digest.id : null;
}

/** Made once and kept in the digest's row, so that every repeat of the mail carries the same one. */
function makeMessageId(from: string, siteCode: string, day: string, personId: number): string {
  const domain = from.slice(from.lastIndexOf('@') + 1);
  const unique = randomBytes(8).toString('hex');
  return `<reminders.${siteCode}.${day}.${personId}.${unique}@${domain}>`;
}
