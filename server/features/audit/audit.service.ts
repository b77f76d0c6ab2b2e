import { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Tx } from '#server/db/client.ts';
import type { Deps } from '#server/deps.ts';
import { decodeCursor, encodeCursor, rowsToRead, toPage } from '#server/paging.ts';
import type { Page, PageQuery } from '#server/paging.ts';
import type { AuditEventDto } from '#shared/contracts/audit.contract.ts';
import { presentAuditEvent } from './audit.presenter.ts';
import { insertAuditEvent, listAuditRows } from './audit.repository.ts';
import type { AuditFilter } from './audit.repository.ts';

export type AuditEntry = {
  /** Null where the system itself acts. */
  readonly actor: Pick<SignedIn, 'personId'> | null;
  /** Null for what concerns no single site. */
  readonly site: Pick<SiteScope, 'id'> | null;
  /** What was done, in the words of the actions where there is one: `booking.confirm`. */
  readonly action: string;
  readonly subjectKind: string;
  readonly subjectId: number | null;
  /** The subject as it was and as it is now, as far as it changed. */
  readonly before?: unknown;
  readonly after?: unknown;
};

/**
 * Writes who did what into the transaction that does it: no change without its trail, and no trail
 * without its change.
 */
export async function recordAudit(
  deps: Pick<Deps, 'clock' | 'requestId'>,
  tx: Tx,
  entry: AuditEntry,
): Promise<void> {
  await insertAuditEvent(tx, {
    at: deps.clock.now(),
    actorId: entry.actor?.personId ?? null,
    siteId: entry.site?.id ?? null,
    action: entry.action,
    subjectKind: entry.subjectKind,
    subjectId: entry.subjectId,
    before: entry.before ?? null,
    after: entry.after ?? null,
    requestId: deps.requestId,
  });
}

const sort = 'newest';

export async function listAuditEvents(
  deps: Pick<Deps, 'db'>,
  site: SiteScope,
  query: PageQuery & Omit<AuditFilter, 'siteId'>,
): Promise<Page<AuditEventDto>> {
  const { cursor, limit, ...filter } = query;
  const after = decodeCursor(sort, z.tuple([z.int()]), cursor);
  const rows = await listAuditRows(
    deps.db,
    { ...filter, siteId: site.id },
    after?.[0],
    rowsToRead(limit === undefined ? {} : { limit }),
  );
  return toPage(rows, query, presentAuditEvent, ({ event }) => encodeCursor(sort, [event.id]));
}
