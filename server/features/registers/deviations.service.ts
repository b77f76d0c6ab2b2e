import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Reader, Tx } from '#server/db/client.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { maySeeRequest } from '#server/features/availability/slot-request.service.ts';
import { reassessRequest } from '#server/features/bookings/reassess-bookings.service.ts';
import { lockRequest, requireVisible } from '#server/features/requests/requests.service.ts';
import { notFound, problem, refused } from '#server/problem.ts';
import type {
  askDeviation as askContract,
  decideDeviation as decideContract,
  DeviationDto,
} from '#shared/contracts/registers.contract.ts';
import { checkRules } from '#shared/domain/checks/check-rules.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';
import { may } from '#shared/domain/policies/may.ts';
import type { RequestState } from '#shared/domain/states.ts';
import {
  findRequestOf,
  insertDeviation,
  listAsked,
  listOfRequest,
  lockDeviation,
  writeDecision,
} from './deviations.repository.ts';
import type { DeviationRecord } from './deviations.repository.ts';

type Reading = Pick<Deps, 'clock' | 'db'>;
type Changing = Pick<Deps, 'clock' | 'db' | 'requestId' | 'transact'>;
type Who = { readonly actor: SignedIn; readonly site: SiteScope; readonly id: number };

export async function listDeviations(
  deps: Reading,
  { actor, site, id }: Who,
): Promise<DeviationDto[]> {
  await requireVisible(deps.db, actor, site, id);
  const now = deps.clock.now();
  return (await listOfRequest(deps.db, id)).map((row) => presentDeviation(row, now));
}

/** Those that wait for a decision, for who may give it. */
export async function listWaitingDeviations(reader: Reader, site: SiteScope, actor: SignedIn) {
  const rows = await listAsked(reader, site.id);
  return rows.filter((row) => mayDecide(actor, site, row));
}

/** Asks that a rule be lifted for one request; what nobody may lift is refused at once. */
export async function askDeviation(
  deps: Changing,
  { actor, site, id }: Who,
  wish: z.output<typeof askContract.body>,
): Promise<DeviationDto> {
  return deps.transact(async (tx) => {
    await lockRequest(tx, site.id, id);
    const request = await requireVisible(tx, actor, site, id);
    if (!may(actor, 'request.edit', site.code, { ownerId: request.requesterId })) {
      throw refused('Only the person who asked for the slot can ask for a deviation. Ask them.');
    }
    requireOpen(id, request.state);
    const rule = checkRules[wish.code];
    if (rule.isNeverLifted) {
      throw problem('deviation.not-liftable', {
        detail: `Nobody may lift "${rule.title}": it protects people, cells or the meaning of the result. Change the request or choose another slot.`,
      });
    }
    await requireNew(tx, id, wish.code, rule.title);
    const now = deps.clock.now();
    const made = await insertDeviation(tx, {
      requestId: id,
      checkCode: wish.code,
      reason: wish.reason,
      requestedById: actor.personId,
      at: now,
    });
    await recordAudit(deps, tx, {
      actor,
      site,
      action: 'deviation.ask',
      subjectKind: 'deviation',
      subjectId: made,
      after: { requestId: id, ...wish },
    });
    const rows = await listOfRequest(tx, id);
    return presentDeviation(requireRow(rows.find((row) => row.deviation.id === made)), now);
  });
}

/** A rule that waits for a decision is not asked for twice. */
async function requireNew(tx: Tx, requestId: number, code: CheckCode, title: string) {
  const present = (await listOfRequest(tx, requestId)).find(
    ({ deviation }) => deviation.checkCode === code && deviation.state === 'asked',
  );
  if (present !== undefined) {
    throw problem('request.state', {
      detail: `Deviation ${present.deviation.id} for "${title}" waits for a decision already. Ask a metrologist or manager to decide it.`,
    });
  }
}

/** Somebody other than the asker and the requester grants or refuses. */
export async function decideDeviation(
  deps: Changing,
  { actor, site, id }: Who,
  wish: z.output<typeof decideContract.body>,
): Promise<DeviationDto> {
  return deps.transact(async (tx) => {
    await lockRequestOf(tx, site, id);
    const row = await lockDeviation(tx, site.id, id);
    if (row === undefined || !maySeeRequest(actor, site.code, row)) {
      throw notFound('such deviation');
    }
    requireOther(actor, site, row);
    if (row.deviation.state !== 'asked') {
      throw problem('request.state', {
        detail: `Deviation ${id} is decided already by ${row.decidedBy ?? 'somebody'}. Reload the page to see how.`,
      });
    }
    requireOpen(row.deviation.requestId, row.requestState);
    const now = deps.clock.now();
    requireSense(wish, row, now);
    const state = wish.grant ? 'granted' : 'refused';
    await writeDecision(tx, id, {
      state,
      decisionReason: wish.reason,
      customerAcceptance: wish.customerAcceptance,
      decidedById: actor.personId,
      decidedAt: now,
      expiresAt: wish.expiresAt === null ? null : new Date(wish.expiresAt),
    });
    await recordAudit(deps, tx, {
      actor,
      site,
      action: `deviation.${wish.grant ? 'grant' : 'refuse'}`,
      subjectKind: 'deviation',
      subjectId: id,
      before: { state: 'asked' },
      after: { state, ...wish },
    });
    const requestId = row.deviation.requestId ?? 0;
    if (wish.grant) {
      // What was at risk because of the rule may stand from now on.
      await reassessRequest(deps, tx, site, requestId, actor);
    }
    const rows = await listOfRequest(tx, requestId);
    return presentDeviation(requireRow(rows.find((each) => each.deviation.id === id)), now);
  });
}

function mayDecide(actor: SignedIn, site: SiteScope, row: DeviationRecord): boolean {
  return (
    row.requesterId !== actor.personId &&
    may(actor, 'deviation.grant', site.code, { authorId: row.deviation.requestedById })
  );
}

function requireOpen(requestId: number | null, state: RequestState): void {
  if (state === 'done' || state === 'withdrawn') {
    throw problem('request.state', {
      detail: `Request ${requestId ?? ''} is ${state}: there is nothing left to lift a rule for.`,
    });
  }
}

/** The request comes first in the order of locks that everybody keeps. */
async function lockRequestOf(tx: Tx, site: SiteScope, deviationId: number): Promise<void> {
  const requestId = await findRequestOf(tx, deviationId);
  if (requestId !== null) {
    await lockRequest(tx, site.id, requestId);
  }
}

function requireOther(actor: SignedIn, site: SiteScope, row: DeviationRecord): void {
  if (!mayDecide(actor, site, row)) {
    throw problem('deviation.same-person', {
      detail: 'You asked for this yourself. Another metrologist or a manager must decide.',
    });
  }
}

/** Reported work is lifted only with the customer's word, and never without an end in the future. */
function requireSense(
  wish: z.output<typeof decideContract.body>,
  row: DeviationRecord,
  now: Date,
): void {
  const acceptance = wish.customerAcceptance?.trim() ?? '';
  if (wish.grant && row.grade === 'reported' && acceptance === '') {
    const detail = 'For reported work note how the customer agreed.';
    throw problem('input.invalid', {
      detail,
      errors: [{ detail, pointer: '#/customerAcceptance' }],
    });
  }
  if (wish.expiresAt !== null && Date.parse(wish.expiresAt) <= now.getTime()) {
    const detail = 'This time is over. Give an end in the future, or none.';
    throw problem('input.invalid', { detail, errors: [{ detail, pointer: '#/expiresAt' }] });
  }
}

function requireRow(row: DeviationRecord | undefined): DeviationRecord {
  if (row === undefined) {
    throw new Error('A deviation written just now is gone.');
  }
  return row;
}

function presentDeviation(
  { deviation, askedBy, decidedBy }: DeviationRecord,
  now: Date,
): DeviationDto {
  const isOver = deviation.expiresAt !== null && deviation.expiresAt <= now;
  return {
    id: deviation.id,
    requestId: deviation.requestId ?? 0,
    code: deviation.checkCode,
    state: deviation.state === 'granted' && isOver ? 'expired' : deviation.state,
    reason: deviation.reason,
    decisionReason: deviation.decisionReason,
    customerAcceptance: deviation.customerAcceptance,
    askedBy,
    askedAt: deviation.requestedAt.toISOString(),
    decidedBy,
    decidedAt: deviation.decidedAt?.toISOString() ?? null,
    expiresAt: deviation.expiresAt?.toISOString() ?? null,
  };
}
