import { DateTime } from 'luxon';
import type { Tx } from '#server/db/client.ts';
import type { Deps } from '#server/deps.ts';
import { addToOutbox } from '#server/features/outbox/outbox.service.ts';
import type { MailMessage } from '#server/integrations/mail.ts';
import { sendReminderDigestJob } from '#server/jobs/definitions/send-reminder-digest.job.ts';
import { PoisonJobError } from '#server/jobs/job-queue.ts';
import { writeDigestMail } from './digest-mail.presenter.ts';
import {
  dropDigest,
  isMetrologist,
  leaseDigest,
  listLeftBehind,
  listStandingItems,
  lockDigest,
  markSent,
  releaseDigest,
} from './digests.repository.ts';
import type { DigestRow, StandingItem } from './digests.repository.ts';

type Sending = Pick<Deps, 'clock' | 'config' | 'log' | 'mail' | 'transact'>;

/** `settled`: it was sent or dropped before. */
export type SendOutcome = 'sent' | 'dropped' | 'settled';

type Claim =
  | { readonly kind: 'mine'; readonly lease: Date; readonly mail: MailMessage }
  | { readonly kind: 'not-mine'; readonly outcome: 'dropped' | 'settled' };

/** Another worker sends it now, or died over it: to be tried again when its lease has run out. */
export class DigestHeldError extends Error {
  override readonly name = 'DigestHeldError';
}

/**
 * Sends one digest, read afresh. Its row is leased for longer than the mail server is given time, so
 * that nobody else sends it meanwhile, and marked sent afterwards: a mail can go out twice only where
 * this ends between the server's acceptance and that mark, and then under the same Message-ID.
 */
export async function sendReminderDigest(deps: Sending, digestId: number): Promise<SendOutcome> {
  const claim = await deps.transact((tx) => claimDigest(deps, tx, digestId));
  if (claim.kind === 'not-mine') {
    deps.log.info({ digestId, outcome: claim.outcome }, 'digest not sent');
    return claim.outcome;
  }
  const { lease, mail } = claim;
  try {
    await deps.mail.send(mail);
  } catch (error) {
    await deps.transact((tx) => releaseDigest(tx, digestId, lease, deps.clock.now()));
    throw error;
  }
  const isMarked = await deps.transact((tx) => markSent(tx, digestId, lease, deps.clock.now()));
  if (isMarked) {
    deps.log.info({ digestId }, 'digest sent');
  } else {
    deps.log.error({ digestId }, 'digest sent after its lease had passed on');
  }
  return 'sent';
}

async function claimDigest(deps: Sending, tx: Tx, digestId: number): Promise<Claim> {
  const digest = await lockDigest(tx, digestId);
  if (digest === undefined) {
    throw new PoisonJobError(`There is no digest ${digestId}.`);
  }
  const now = deps.clock.now();
  if (digest.state === 'sent' || digest.state === 'dropped') {
    return { kind: 'not-mine', outcome: 'settled' };
  }
  if (isHeld(digest, now)) {
    throw new DigestHeldError(`Digest ${digestId} is being sent by another worker.`);
  }
  const { person, site } = digest;
  const items = await listOwnItems(tx, digest);
  if (person.email === null || person.barredAt !== null || items.length === 0) {
    await dropDigest(tx, digestId);
    return { kind: 'not-mine', outcome: 'dropped' };
  }
  const lease = new Date(now.getTime() + leaseMs(deps));
  await leaseDigest(tx, digestId, lease);
  const written = writeDigestMail({
    site,
    today: DateTime.fromJSDate(now, { zone: site.zone }).toISODate() ?? digest.day,
    publicUrl: deps.config.publicUrl,
    items,
  });
  return {
    kind: 'mine',
    lease,
    mail: { ...written, to: person.email, messageId: digest.messageId },
  };
}

function isHeld({ state, leaseUntil }: DigestRow, now: Date): boolean {
  return state === 'sending' && leaseUntil !== null && leaseUntil > now;
}

/** Half as long again as a mail may take: time for the mark, and for clocks that differ. */
function leaseMs({ config }: Pick<Deps, 'config'>): number {
  return config.mail.patienceMs * 1.5;
}

/** A person who is no longer concerned is no longer told. */
async function listOwnItems(tx: Tx, { id, person, site }: DigestRow): Promise<StandingItem[]> {
  const items = await listStandingItems(tx, id, site.id);
  const seesAll = await isMetrologist(tx, person.id, site.id);
  return items.filter((item) => seesAll || item.custodianId === person.id);
}

const resumeLimit = 500;
const roundMs = 5 * 60_000;

/** Queues again what was left behind, at most once in five minutes each. */
export async function resumeReminderDigests(
  deps: Pick<Deps, 'clock' | 'db' | 'log' | 'requestId' | 'transact'>,
): Promise<number> {
  const now = deps.clock.now();
  const ids = await listLeftBehind(deps.db, now, resumeLimit);
  if (ids.length > 0) {
    const round = Math.floor(now.getTime() / roundMs);
    await deps.transact((tx) =>
      addToOutbox(
        deps,
        tx,
        sendReminderDigestJob,
        ids.map((digestId) => ({ digestId, round })),
      ),
    );
    deps.log.warn({ count: ids.length }, 'digests left behind are queued again');
  }
  return ids.length;
}
