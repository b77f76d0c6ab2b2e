import type { SignedIn, SiteScope } from '#server/actor.ts';
import { lockPlaces } from '#server/db/lock-places.ts';
import type { Reader, Tx } from '#server/db/client.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { listBookingRowsOfLoad } from '#server/features/bookings/bookings.service.ts';
import { notFound, problem, staleVersion } from '#server/problem.ts';
import type { LoadDto } from '#shared/contracts/bookings.contract.ts';
import { presentLoad } from './loads.presenter.ts';
import { findLoad, listPhases, sumContents, updateLoadState } from './loads.repository.ts';
import type { LoadRecord } from './loads.repository.ts';

type Changing = Pick<Deps, 'clock' | 'db' | 'requestId' | 'transact'>;

export async function getLoad(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
  loadId: number,
): Promise<LoadDto> {
  return describeLoad(deps.db, actor, site, await requireLoad(deps.db, site, loadId));
}

/** Lets nobody join any more. Bookings that are in stay in. */
export async function closeLoad(
  deps: Changing,
  actor: SignedIn,
  site: SiteScope,
  input: { readonly loadId: number; readonly version: number },
): Promise<LoadDto> {
  return changeLoad(deps, actor, site, input, (record) => {
    if (record.load.state !== 'open') {
      throw problem('load.state', {
        detail: `Load ${record.load.id} is ${record.load.state}. Only an open load can be closed.`,
      });
    }
    return { action: 'load.close', change: { state: 'closed' } };
  });
}

/** Lets bookings join again until a time before its start. */
export async function reopenLoad(
  deps: Changing,
  actor: SignedIn,
  site: SiteScope,
  input: { readonly loadId: number; readonly version: number; readonly closesAt: string },
): Promise<LoadDto> {
  const now = deps.clock.now();
  const closesAt = new Date(input.closesAt);
  return changeLoad(deps, actor, site, input, (record, startMs) => {
    const { id, state } = record.load;
    if (state !== 'closed' && state !== 'open') {
      throw problem('load.state', {
        detail: `Load ${id} is ${state}. Only a closed load can be opened again.`,
      });
    }
    if (startMs <= now.getTime()) {
      throw problem('load.state', {
        detail: `Load ${id} is being connected already. Nothing can join it any more.`,
      });
    }
    if (closesAt.getTime() <= now.getTime() || closesAt.getTime() > startMs) {
      throw problem('load.state', {
        detail: `The closing time of load ${id} must lie after now and not after its start. Choose another.`,
      });
    }
    return { action: 'load.reopen', change: { state: 'open', closesAt } };
  });
}

type LoadChange = {
  readonly action: string;
  readonly change: Parameters<typeof updateLoadState>[2];
};

async function changeLoad(
  deps: Changing,
  actor: SignedIn,
  site: SiteScope,
  input: { readonly loadId: number; readonly version: number },
  decide: (record: LoadRecord, startMs: number) => LoadChange,
): Promise<LoadDto> {
  return deps.transact(async (tx) => {
    const seen = await requireLoad(tx, site, input.loadId);
    await lockPlaces(tx, { chamberIds: [seen.load.chamberId], unitIds: [] });
    const record = await requireLoad(tx, site, input.loadId);
    if (record.load.version !== input.version) {
      throw await refuseStale(tx, actor, site, record);
    }
    const [first] = await listPhases(tx, input.loadId);
    const { action, change } = decide(record, first?.during.startMs ?? Infinity);
    const at = deps.clock.now();
    const of = { id: input.loadId, version: input.version };
    if (!(await updateLoadState(tx, of, change, at))) {
      throw await refuseStale(tx, actor, site, await requireLoad(tx, site, input.loadId));
    }
    await recordAudit(deps, tx, {
      actor,
      site,
      action,
      subjectKind: 'load',
      subjectId: input.loadId,
      before: { state: record.load.state, closesAt: record.load.closesAt },
      after: change,
    });
    return describeLoad(tx, actor, site, await requireLoad(tx, site, input.loadId));
  });
}

async function refuseStale(tx: Tx, actor: SignedIn, site: SiteScope, record: LoadRecord) {
  return staleVersion(`load ${record.load.id}`, await describeLoad(tx, actor, site, record));
}

async function requireLoad(reader: Reader, site: SiteScope, loadId: number): Promise<LoadRecord> {
  const record = await findLoad(reader, site.id, loadId);
  if (record === undefined) {
    throw notFound('such load');
  }
  return record;
}

async function describeLoad(
  reader: Reader,
  actor: SignedIn,
  site: SiteScope,
  record: LoadRecord,
): Promise<LoadDto> {
  const { id: loadId, chamberId } = record.load;
  return presentLoad({
    record,
    phases: await listPhases(reader, loadId),
    bookings: await listBookingRowsOfLoad({ db: reader }, actor, site, loadId),
    contents: await sumContents(reader, { loadId, chamberId }),
  });
}
