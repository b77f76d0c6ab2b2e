import { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Reader, Tx } from '#server/db/client.ts';
import type { Deps } from '#server/deps.ts';
import { maySeeRequest } from '#server/features/availability/slot-request.service.ts';
import { decodeCursor, encodeCursor, rowsToRead, toPage } from '#server/paging.ts';
import type { Page } from '#server/paging.ts';
import { notFound } from '#server/problem.ts';
import type {
  listRequests as listContract,
  RequestDto,
  RequestRow as RequestListRow,
} from '#shared/contracts/requests.contract.ts';
import { seesProject } from '#shared/domain/policies/sees-project.ts';
import { presentRequest, presentRequestRow } from './requests.presenter.ts';
import {
  findWholeRequest,
  listBookingsOfLots,
  listCellsOfLots,
  listLots,
  listRequestRows,
  lockRequestRow,
  updateRequest,
} from './requests.repository.ts';
import type { RequestFilter, RequestRow } from './requests.repository.ts';

type Reading = Pick<Deps, 'db'>;
type Query = z.output<typeof listContract.query>;

export async function listRequests(
  deps: Reading,
  actor: SignedIn,
  site: SiteScope,
  query: Query,
): Promise<Page<RequestListRow>> {
  const sort = query.sort ?? 'needed-by';
  const after = decodeCursor(sort, z.tuple([z.number().nullable(), z.int()]), query.cursor);
  const rows = await listRequestRows(
    deps.db,
    filterOf(actor, site, query),
    sort,
    after,
    rowsToRead(query),
  );
  return toPage(rows, query, presentRequestRow, ({ sortMs, request }) =>
    encodeCursor(sort, [sortMs, request.id]),
  );
}

function filterOf(actor: SignedIn, site: SiteScope, query: Query): RequestFilter {
  const { state, kind, projectId, mine, text, neededBefore } = query;
  return {
    siteId: site.id,
    zone: site.zone,
    visibleTo: {
      personId: actor.personId,
      projectIds: seesEveryProject(actor, site) ? null : actor.projectIds,
    },
    ...(state === undefined ? {} : { states: state }),
    ...(kind === undefined ? {} : { kind }),
    ...(projectId === undefined ? {} : { projectId }),
    ...(mine === 'true' ? { requesterId: actor.personId } : {}),
    ...(text === undefined ? {} : { text }),
    ...(neededBefore === undefined ? {} : { neededBefore }),
  };
}

/** Nobody is a member of project 0: who sees it sees every project, by role. */
export function seesEveryProject(actor: SignedIn, site: SiteScope): boolean {
  return seesProject(actor, site.code, 0);
}

export async function getRequest(
  deps: Reading,
  actor: SignedIn,
  site: SiteScope,
  requestId: number,
): Promise<RequestDto> {
  await requireVisible(deps.db, actor, site, requestId);
  return describeRequest(deps.db, site, requestId);
}

/** The request as far as permission depends on it; one the caller may not see is not there. */
export async function requireVisible(
  reader: Reader,
  actor: SignedIn,
  site: SiteScope,
  requestId: number,
): Promise<RequestRow> {
  const whole = await findWholeRequest(reader, requestId);
  if (whole?.request.siteId !== site.id || !maySeeRequest(actor, site.code, whole.request)) {
    throw notFound('such request');
  }
  return whole.request;
}

/** A request with its lots, as it stands. Whoever calls has made sure that the caller may see it. */
export async function describeRequest(
  reader: Reader,
  site: SiteScope,
  requestId: number,
): Promise<RequestDto> {
  const whole = await findWholeRequest(reader, requestId);
  if (whole === undefined) {
    throw notFound('such request');
  }
  const lots = await listLots(reader, requestId);
  const lotIds = lots.map(({ lot }) => lot.id);
  return presentRequest({
    whole,
    siteCode: site.code,
    lots,
    cells: await listCellsOfLots(reader, lotIds),
    bookings: await listBookingsOfLots(reader, lotIds),
  });
}

/** The request's row, locked until the transaction ends; undefined where the site has none of that number. */
export function lockRequest(tx: Tx, siteId: number, requestId: number) {
  return lockRequestRow(tx, siteId, requestId);
}

/** Writes to a locked request and counts its version up. */
export function writeRequest(...given: Parameters<typeof updateRequest>): Promise<void> {
  return updateRequest(...given);
}
