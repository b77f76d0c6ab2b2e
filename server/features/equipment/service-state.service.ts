import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Tx } from '#server/db/client.ts';
import { lockInstruments } from '#server/db/lock-places.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { listBookingRows } from '#server/features/bookings/bookings.service.ts';
import { reassessBookings } from '#server/features/bookings/reassess-bookings.service.ts';
import { problem, staleVersion } from '#server/problem.ts';
import type { stateChangeSchema } from '#shared/contracts/equipment.contract.ts';
import { describeInstrument, requireInstrument } from './equipment.service.ts';
import {
  endUnavailability,
  insertUnavailability,
  listOpenUnavailability,
  updateInstrumentState,
} from './equipment.repository.ts';
import type { RegisterRow } from './equipment.repository.ts';

export type Changing = Pick<Deps, 'clock' | 'db' | 'requestId' | 'transact'>;
type StateChange = z.input<typeof stateChangeSchema>;
type Who = { readonly actor: SignedIn; readonly site: SiteScope; readonly tag: string };

/** Takes an instrument and all that is mounted in it out of service; bookings over it become at risk. */
export async function takeOutOfService(
  deps: Changing,
  who: Who,
  wish: { readonly version: number; readonly reason: string; readonly until: string | null },
): Promise<StateChange> {
  requireFuture(deps, wish.until);
  return change(deps, who, async (tx, row) => {
    const { instrument } = row;
    if (instrument.state === 'out-of-service' || instrument.state === 'retired') {
      throw problem('instrument.state', {
        detail: `${instrument.tag} is not in service already. Reload the page to see its state.`,
      });
    }
    const at = deps.clock.now();
    await setState(deps, tx, who, row, { state: 'out-of-service', version: wish.version });
    await insertUnavailability(tx, {
      instrumentId: instrument.id,
      reason: 'withdrawn',
      note: wish.reason,
      startsAt: at,
      endsAt: wish.until === null ? null : new Date(wish.until),
      reportedById: who.actor.personId,
      createdAt: at,
      updatedAt: at,
    });
    return {
      action: 'equipment.take-out-of-service',
      before: { state: instrument.state },
      after: { state: 'out-of-service', reason: wish.reason, until: wish.until },
    };
  });
}

/** Releases an instrument: what was open on it ends now, and risks that came only from it are cleared. */
export async function returnToService(
  deps: Changing,
  who: Who,
  wish: { readonly version: number; readonly note: string },
): Promise<StateChange> {
  return change(deps, who, async (tx, row) => {
    const { instrument } = row;
    const at = deps.clock.now();
    const open = await listOpenUnavailability(tx, [instrument.id], at);
    const isBlocked = instrument.state !== 'in-service' || open.length > 0;
    if (instrument.state === 'retired' || !isBlocked) {
      throw problem('instrument.state', {
        detail:
          instrument.state === 'retired'
            ? `${instrument.tag} is retired and does not come back into service.`
            : `${instrument.tag} is in service already. Reload the page to see its state.`,
      });
    }
    await setState(deps, tx, who, row, {
      state: 'in-service',
      version: wish.version,
      releasedById: who.actor.personId,
      releasedAt: at,
    });
    await endUnavailability(tx, instrument.id, who.actor.personId, at);
    return {
      action: 'equipment.release',
      before: { state: instrument.state, open: open.map(({ row: each }) => each.note) },
      after: { state: 'in-service', note: wish.note },
    };
  });
}

/** Whoever sees it broken says so: nothing new is booked over it until a metrologist decides. */
export async function reportBreakdown(
  deps: Changing,
  who: Who,
  wish: { readonly reason: string; readonly until: string | null },
): Promise<StateChange> {
  requireFuture(deps, wish.until);
  return change(deps, who, async (tx, row) => {
    const at = deps.clock.now();
    await insertUnavailability(tx, {
      instrumentId: row.instrument.id,
      reason: 'breakdown',
      note: wish.reason,
      startsAt: at,
      endsAt: wish.until === null ? null : new Date(wish.until),
      reportedById: who.actor.personId,
      createdAt: at,
      updatedAt: at,
    });
    return {
      action: 'breakdown.report',
      before: null,
      after: { reason: wish.reason, until: wish.until },
    };
  });
}

type Trail = { readonly action: string; readonly before: unknown; readonly after: unknown };

/** Locks, changes, checks the bookings again and keeps the trail: the frame of all three. */
async function change(
  deps: Changing,
  who: Who,
  act: (tx: Tx, row: RegisterRow) => Promise<Trail>,
): Promise<StateChange> {
  const { actor, site, tag } = who;
  return deps.transact(async (tx) => {
    const { instrument } = await requireInstrument({ db: tx }, site, tag);
    const places = await lockInstruments(tx, [instrument.id]);
    // Read again behind the locks: what decides must not be older than they are.
    const trail = await act(tx, await requireInstrument({ db: tx }, site, tag));
    await recordAudit(deps, tx, {
      actor,
      site,
      subjectKind: 'instrument',
      subjectId: instrument.id,
      ...trail,
    });
    const touched = await reassessBookings(deps, tx, site, places, actor);
    const reading = { clock: deps.clock, db: tx };
    return {
      instrument: await describeInstrument(
        reading,
        actor,
        site,
        await requireInstrument(reading, site, tag),
      ),
      affected: await listBookingRows(
        reading,
        actor,
        site,
        touched.map(({ bookingId }) => bookingId),
      ),
    };
  });
}

async function setState(
  deps: Changing,
  tx: Tx,
  { actor, site, tag }: Who,
  row: RegisterRow,
  wish: Parameters<typeof updateInstrumentState>[2] & { readonly version: number },
): Promise<void> {
  const { version, ...values } = wish;
  const seen = { id: row.instrument.id, version };
  if (!(await updateInstrumentState(tx, seen, values, deps.clock.now()))) {
    const reading = { clock: deps.clock, db: tx };
    throw staleVersion(tag, await describeInstrument(reading, actor, site, row));
  }
}

function requireFuture(deps: Pick<Deps, 'clock'>, until: string | null): void {
  if (until !== null && Date.parse(until) <= deps.clock.now().getTime()) {
    const detail = 'This time is over. Choose a later one, or leave it empty when nobody knows.';
    throw problem('input.invalid', { detail, errors: [{ detail, pointer: '#/until' }] });
  }
}
