import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Tx } from '#server/db/client.ts';
import { lockInstruments } from '#server/db/lock-places.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { loadSiteValidity } from '#server/features/availability/validity.service.ts';
import { listBookingRows } from '#server/features/bookings/bookings.service.ts';
import { reassessBookings } from '#server/features/bookings/reassess-bookings.service.ts';
import { problem, staleVersion } from '#server/problem.ts';
import type { decisionSchema } from '#shared/contracts/calibrations.contract.ts';
import { may } from '#shared/domain/policies/may.ts';
import { describeRecord, requireRecord } from './calibrations.service.ts';
import {
  listDutiesOf,
  markReplaced,
  updateDutyDueDay,
  updateRecord,
} from './calibrations.repository.ts';
import type { RecordRow } from './calibrations.repository.ts';
import { isOfDuty } from './duties.service.ts';
import type { Changing } from './record-calibration.service.ts';

type Decision = z.input<typeof decisionSchema>;
type Who = { readonly actor: SignedIn; readonly site: SiteScope; readonly id: number };

/** A second person approves: what can be booked follows in the same transaction. */
export async function approveCalibration(
  deps: Changing,
  who: Who,
  wish: { readonly version: number },
): Promise<Decision> {
  const { actor, site, id } = who;
  return deps.transact(async (tx) => {
    const row = await requireRecord({ db: tx }, site, id);
    const { record } = row;
    // Before the decision is read again: no booking may slip in between, and of two deciders one waits.
    const places = await lockInstruments(tx, [record.instrumentId]);
    await decide(deps, tx, who, wish.version, { state: 'approved' });
    await replace(deps, tx, row);
    await moveDuties(deps, tx, site, record.instrumentId);
    const touched = await reassessBookings(deps, tx, site, places, actor);
    return {
      calibration: await describeRecord({ db: tx }, await requireRecord({ db: tx }, site, id)),
      affected: await listBookingRows(
        { db: tx },
        actor,
        site,
        touched.map(({ bookingId }) => bookingId),
      ),
    };
  });
}

/** A second person sends the record back; it never counted and never will. */
export async function refuseCalibration(
  deps: Changing,
  who: Who,
  wish: { readonly version: number; readonly reason: string },
): Promise<Decision> {
  const { site, id } = who;
  return deps.transact(async (tx) => {
    const { record } = await requireRecord({ db: tx }, site, id);
    await lockInstruments(tx, [record.instrumentId]);
    await decide(deps, tx, who, wish.version, { state: 'refused', refusalReason: wish.reason });
    return {
      calibration: await describeRecord({ db: tx }, await requireRecord({ db: tx }, site, id)),
      affected: [],
    };
  });
}

async function decide(
  deps: Changing,
  tx: Tx,
  { actor, site, id }: Who,
  version: number,
  outcome: { readonly state: 'approved' | 'refused'; readonly refusalReason?: string },
): Promise<void> {
  const row = await requireRecord({ db: tx }, site, id);
  await requireUndecided(tx, row);
  if (!may(actor, 'calibration.approve', site.code, { authorId: row.record.recordedById })) {
    throw problem('calibration.same-person', {
      detail: `You recorded calibration ${id} yourself. Ask another metrologist or a manager to decide.`,
    });
  }
  const at = deps.clock.now();
  const change = { ...outcome, decidedById: actor.personId, decidedAt: at };
  if (!(await updateRecord(tx, { id, version }, change, at))) {
    throw staleVersion(`calibration ${id}`, await describeRecord({ db: tx }, row));
  }
  await recordAudit(deps, tx, {
    actor,
    site,
    action: outcome.state === 'approved' ? 'calibration.approve' : 'calibration.refuse',
    subjectKind: 'calibration',
    subjectId: id,
    before: { state: row.record.state },
    after: outcome,
  });
}

async function requireUndecided(tx: Tx, row: RecordRow): Promise<void> {
  if (row.record.state !== 'awaiting-approval') {
    throw problem('calibration.state', {
      detail: `Calibration ${row.record.id} is decided already${row.decidedBy === null ? '' : ` by ${row.decidedBy}`}. Reload the page to see how.`,
      current: await describeRecord({ db: tx }, row),
    });
  }
}

async function replace(deps: Changing, tx: Tx, row: RecordRow): Promise<void> {
  const { replacesId } = row.record;
  if (replacesId === null || (await markReplaced(tx, replacesId, deps.clock.now()))) {
    return;
  }
  throw problem('calibration.state', {
    detail: `Calibration ${replacesId}, which this one corrects, has been replaced meanwhile. Refuse this record and correct the newer one.`,
    current: await describeRecord({ db: tx }, row),
  });
}

/** A duty follows the records: its next day is the earliest on which something of it runs out. */
async function moveDuties(
  deps: Changing,
  tx: Tx,
  site: SiteScope,
  instrumentId: number,
): Promise<void> {
  const now = deps.clock.now();
  const validity = await loadSiteValidity(tx, site, now.getTime(), [instrumentId]);
  for (const duty of await listDutiesOf(tx, instrumentId)) {
    const dueOn = validity.badgeOf(instrumentId, isOfDuty(duty))?.dueOn ?? null;
    if (dueOn !== null && dueOn !== duty.nextDueOn) {
      await updateDutyDueDay(tx, duty.id, dueOn, now);
    }
  }
}
