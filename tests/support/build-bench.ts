import { eq } from 'drizzle-orm';
import { sitesTable } from '#server/db/tables/site.table.ts';
import { confirmBooking } from '#shared/contracts/bookings.contract.ts';
import type { BookingDto } from '#shared/contracts/bookings.contract.ts';
import { findOffers } from '#shared/contracts/offers.contract.ts';
import type { OfferDto } from '#shared/contracts/offers.contract.ts';
import { buildBookableChamber } from './build-bookable.ts';
import type { BookableChamber, Keepers } from './build-bookable.ts';
import { buildCellType, buildProject, buildRequest } from './build-request.ts';
import type { BuiltRequest } from './build-request.ts';
import type { TestApp } from './test-app.ts';
import type { TestPerson } from './test-people.ts';

/** One chamber of four paths in larkfen, an engineer with a project, and a scheduler. */
export type Bench = {
  readonly app: TestApp;
  readonly keepers: Keepers;
  readonly chamber: BookableChamber;
  readonly engineer: TestPerson;
  readonly scheduler: TestPerson;
  readonly projectId: number;
  readonly cellTypeId: number;
  request(wish?: Partial<Parameters<typeof buildRequest>[1]>): Promise<BuiltRequest>;
  /** The first offer for a request. */
  offer(request: BuiltRequest): Promise<OfferDto>;
  /** Books a request at its first offer, or elsewhere where a change says so. */
  book(request: BuiltRequest, change?: Partial<OfferDto['placement']>): Promise<BookingDto>;
};

let nextNumber = 10;

/** Chambers are numbered through, because tags are unique over the company. */
export async function buildBench(
  app: TestApp,
  chamberWish: { readonly isStrict?: boolean; readonly size?: number } = {},
): Promise<Bench> {
  const scheduler = await app.signInAs({ roles: ['scheduler'], name: 'Sal Scheduler' });
  const engineer = await app.signInAs({ roles: ['engineer'], name: 'Enid Engineer' });
  const [site] = await app.db.select().from(sitesTable).where(eq(sitesTable.code, 'larkfen'));
  const siteId = site?.id ?? 0;
  const keepers = { siteId, authorId: scheduler.personId, approverId: engineer.personId };
  nextNumber += 1;
  const chamber = await buildBookableChamber(app.db, keepers, {
    number: String(nextNumber),
    ...chamberWish,
  });
  const projectId = await buildProject(app.db, [engineer.personId]);
  const cellTypeId = await buildCellType(app.db, scheduler.personId);
  const request: Bench['request'] = (wish = {}) =>
    buildRequest(app.db, {
      siteId,
      requesterId: engineer.personId,
      projectId,
      cellTypeId,
      ...wish,
    });
  const offer: Bench['offer'] = async ({ requestId, lotId }) => {
    const { body } = await app.call(findOffers, scheduler, { params: { id: requestId, lotId } });
    const found = body.offers.find(({ chamberTag }) => chamberTag === chamber.chamberTag);
    if (found === undefined) {
      throw new Error(`No offer in ${chamber.chamberTag}: ${JSON.stringify(body.reasons)}`);
    }
    return found;
  };
  const book: Bench['book'] = async (made, change = {}) => {
    const { placement } = await offer(made);
    const { body } = await app.call(confirmBooking, scheduler, {
      body: {
        requestId: made.requestId,
        lotId: made.lotId,
        requestVersion: made.version,
        placement: { ...placement, ...change },
      },
    });
    return body;
  };
  return {
    app,
    keepers,
    chamber,
    engineer,
    scheduler,
    projectId,
    cellTypeId,
    request,
    offer,
    book,
  };
}
