import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Tx } from '#server/db/client.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { notFound, problem, refused, staleVersion } from '#server/problem.ts';
import type { RequestDto, RequestFields } from '#shared/contracts/requests.contract.ts';
import type { Action } from '#shared/domain/policies/actions.ts';
import { may } from '#shared/domain/policies/may.ts';
import { requireSense, requireTimes, toColumns, toLots } from './request-fields.service.ts';
import { describeRequest, lockRequest, requireVisible, writeRequest } from './requests.service.ts';
import {
  insertRequest,
  listBookingsOfLots,
  listEverBookedLots,
  listLots,
  writeLots,
} from './requests.repository.ts';
import type { RequestRow } from './requests.repository.ts';
import {
  announceMissingCells,
  faultsOf,
  listMissingForSubmit,
  submitDraft,
} from './submit-draft.service.ts';

type Changing = Pick<Deps, 'clock' | 'db' | 'requestId' | 'transact'>;
type Who = { readonly actor: SignedIn; readonly site: SiteScope; readonly requestId: number };

/** Keeps a new request as a draft; nothing of it need be complete. */
export async function createRequest(
  deps: Changing,
  actor: SignedIn,
  site: SiteScope,
  fields: RequestFields,
): Promise<RequestDto> {
  return deps.transact(async (tx) => {
    await requireSense(tx, actor, site, fields);
    const at = deps.clock.now();
    const requestId = await insertRequest(tx, {
      ...toColumns(fields),
      siteId: site.id,
      requesterId: actor.personId,
      state: 'draft',
      createdAt: at,
      updatedAt: at,
    });
    await writeLots(tx, { id: requestId, projectId: fields.projectId }, toLots(fields));
    const made = await describeRequest(tx, site, requestId);
    await audit(deps, tx, { actor, site, requestId }, 'request.create', null, made);
    return made;
  });
}

/** Changes a draft or a submitted request; once booked only note and needed-by are free. */
export async function updateRequest(
  deps: Changing,
  who: Who,
  wish: RequestFields & { readonly version: number },
): Promise<RequestDto> {
  const { version, ...fields } = wish;
  return change(deps, who, { action: 'request.edit', version }, async (tx, request, before) => {
    const at = deps.clock.now();
    if (request.state === 'partly-booked' || request.state === 'booked') {
      requireOnlyFree(before, fields);
      requireTimes(fields);
      const { note, neededByAt } = toColumns(fields);
      await writeRequest(tx, request, { note, neededByAt }, at);
      return;
    }
    requireState(request, ['draft', 'submitted']);
    await requireSense(tx, who.actor, who.site, fields);
    await requireKeptLots(tx, request, fields);
    await writeLots(tx, { id: request.id, projectId: fields.projectId }, toLots(fields));
    if (request.state === 'submitted') {
      await keepComplete(tx, who.site, request, fields, at);
    }
    // A slot that was wished for an earlier form of the request says nothing about this one.
    await writeRequest(
      tx,
      request,
      { ...toColumns(fields), proposedOffer: null, proposedAt: null },
      at,
    );
  });
}

/** Hands a complete draft to the schedulers. */
export async function submitRequest(
  deps: Changing,
  who: Who,
  wish: { readonly version: number },
): Promise<RequestDto> {
  return change(deps, who, { action: 'request.edit', ...wish }, async (tx, request) => {
    requireState(request, ['draft']);
    const at = deps.clock.now();
    await writeRequest(tx, request, await submitDraft(tx, request, at), at);
  });
}

/** Takes a request back; what is booked for it must be cancelled first. */
export async function withdrawRequest(
  deps: Changing,
  who: Who,
  wish: { readonly version: number; readonly reason: string },
): Promise<RequestDto> {
  const { version, reason } = wish;
  return change(deps, who, { action: 'request.withdraw', version, reason }, async (tx, request) => {
    const lots = await listLots(tx, request.id);
    const [booking] = await listBookingsOfLots(
      tx,
      lots.map(({ lot }) => lot.id),
    );
    if (booking !== undefined && request.state !== 'done') {
      throw problem('request.state', {
        detail: `Booking ${booking.id} holds places for this request. Cancel it first, then withdraw the request.`,
      });
    }
    requireState(request, ['draft', 'submitted']);
    await writeRequest(
      tx,
      request,
      { state: 'withdrawn', withdrawReason: reason, proposedOffer: null, proposedAt: null },
      deps.clock.now(),
    );
  });
}

/** A scheduler sends a submitted request back to draft and says why. */
export async function declineRequest(
  deps: Changing,
  who: Who,
  wish: { readonly version: number; readonly reason: string },
): Promise<RequestDto> {
  const { version, reason } = wish;
  return change(deps, who, { action: 'request.decline', version, reason }, async (tx, request) => {
    requireState(request, ['submitted']);
    await writeRequest(
      tx,
      request,
      { state: 'draft', declineReason: reason, proposedOffer: null, proposedAt: null },
      deps.clock.now(),
    );
  });
}

/** The frame of every change: visible, allowed, locked, current; then the trail of old and new. */
async function change(
  deps: Changing,
  who: Who,
  wish: { readonly action: Action; readonly version: number; readonly reason?: string },
  act: (tx: Tx, request: RequestRow, before: RequestDto) => Promise<void>,
): Promise<RequestDto> {
  const { actor, site, requestId } = who;
  return deps.transact(async (tx) => {
    const { requesterId: ownerId } = await requireVisible(tx, actor, site, requestId);
    if (!may(actor, wish.action, site.code, { ownerId })) {
      throw refused('Only the person who asked can change this request. Ask them.');
    }
    const request = await lockRequest(tx, site.id, requestId);
    if (request === undefined) {
      throw notFound('such request');
    }
    const before = await describeRequest(tx, site, requestId);
    if (request.version !== wish.version) {
      throw staleVersion(`request ${requestId}`, before);
    }
    await act(tx, request, before);
    const after = await describeRequest(tx, site, requestId);
    const isSubmitted = before.state === 'draft' && after.state === 'submitted';
    await audit(deps, tx, who, isSubmitted ? 'request.submit' : wish.action, before, {
      ...after,
      ...(wish.reason === undefined ? {} : { reason: wish.reason }),
    });
    return after;
  });
}

function requireState(request: RequestRow, states: readonly RequestRow['state'][]): void {
  if (!states.includes(request.state)) {
    throw problem('request.state', {
      detail: `Request ${request.id} is ${standing[request.state]}`,
    });
  }
}

/** Where a request stands, and what to do instead of what cannot be done to it. */
const standing: Readonly<Record<RequestRow['state'], string>> = {
  draft: 'still a draft. Let the person who asked submit it first.',
  submitted: 'with the schedulers already. Reload the page to see where it stands.',
  'partly-booked': 'partly booked. Move or cancel its bookings instead.',
  booked: 'booked. Move or cancel its bookings instead.',
  done: 'done. Keep a new request for what is still needed.',
  withdrawn: 'withdrawn. Keep a new request instead.',
};

/** What a booking rests on is changed by moving or cancelling the booking. */
function requireOnlyFree(before: RequestDto, fields: RequestFields): void {
  if (boundOf(fields) !== boundOf(fieldsOf(before))) {
    const bookings = before.lots.map(({ bookingId }) => bookingId).filter((id) => id !== null);
    throw problem('request.state', {
      detail: `Request ${before.id} is booked: only its note and needed-by can change. For the rest move or cancel booking ${bookings.join(', ')}.`,
    });
  }
}

/** All but what stays free, in a form that can be compared. */
function boundOf(fields: RequestFields): string {
  const lots = toLots(fields).map(({ cellIds, values }) => ({
    values,
    cellIds: cellIds.toSorted((first, second) => first - second),
  }));
  return JSON.stringify([{ ...toColumns(fields), note: null, neededByAt: null }, lots]);
}

function fieldsOf(request: RequestDto): RequestFields {
  return {
    projectId: request.project?.id ?? null,
    kind: request.kind,
    grade: request.grade,
    lots: request.lots.map((lot) => ({
      cellTypeId: lot.cellTypeId,
      cellIds: lot.cellIds,
      cellCount: lot.cellCount,
      stateOfChargePct: lot.stateOfChargePct,
      restedSinceAt: lot.restedSinceAt,
      storageTemperatureC: lot.storageTemperatureC,
      isDamaged: lot.isDamaged,
    })),
    setTemperatureC: request.setTemperatureC,
    setToleranceK: request.setToleranceK,
    tolerance: request.tolerance,
    badToGoodRatio: request.badToGoodRatio,
    earliestStartAt: request.earliestStartAt,
    neededByAt: request.neededByAt,
    maySplit: request.maySplit,
    note: request.note,
  };
}

/** A lot that was booked once stays, because its cancelled booking names it. */
async function requireKeptLots(tx: Tx, request: RequestRow, fields: RequestFields): Promise<void> {
  const booked = await listEverBookedLots(tx, request.id);
  if (booked.some((seq) => seq > fields.lots.length)) {
    throw problem('request.state', {
      detail:
        'A lot that was booked before cannot be taken out. Withdraw this request and ask anew.',
    });
  }
}

async function keepComplete(
  tx: Tx,
  site: SiteScope,
  request: RequestRow,
  fields: RequestFields,
  at: Date,
): Promise<void> {
  const columns = toColumns(fields);
  const missing = listMissingForSubmit(
    columns,
    toLots(fields).map(({ values }) => values),
  );
  if (missing.length > 0 || columns.projectId === null) {
    throw problem('input.invalid', {
      detail: `Request ${request.id} is with the schedulers and must stay complete. Add what is marked.`,
      errors: faultsOf(missing),
    });
  }
  const { projectId } = columns;
  await announceMissingCells(
    tx,
    { siteId: site.id, projectId },
    await listLots(tx, request.id),
    at,
  );
}

async function audit(
  deps: Changing,
  tx: Tx,
  { actor, site, requestId }: Who,
  action: string,
  before: RequestDto | null,
  after: RequestDto & { readonly reason?: string },
): Promise<void> {
  await recordAudit(deps, tx, {
    actor,
    site,
    action,
    subjectKind: 'request',
    subjectId: requestId,
    before,
    after,
  });
}
