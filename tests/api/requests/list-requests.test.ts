import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { projectsTable } from '#server/db/tables/project.table.ts';
import { proposeOffer } from '#shared/contracts/offers.contract.ts';
import { createRequest, listRequests, requestSorts } from '#shared/contracts/requests.contract.ts';
import type { RequestRow } from '#shared/contracts/requests.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildCellType, buildProject } from '#tests/support/build-request.ts';
import { emptyForm } from '#tests/support/request-wish.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestPerson } from '#tests/support/test-people.ts';

let bench: Bench;
/** One test's requests: their project names them apart from those of the others. */
let projectId: number;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
});
afterAll(() => bench.app.stop());

const list = async (
  query: Readonly<Record<string, string | number>>,
  person: TestPerson = bench.scheduler,
) => (await bench.app.call(listRequests, person, { query })).body;
const ids = (rows: readonly RequestRow[]) => rows.map(({ id }) => id);

async function makeProject(name: string): Promise<void> {
  projectId = await buildProject(bench.app.db, [bench.engineer.personId]);
  await bench.app.db.update(projectsTable).set({ name }).where(eq(projectsTable.id, projectId));
}

test('every order pages through all rows once, ties and open ends included', async () => {
  await makeProject('Paging');
  const days = [null, '2026-04-01', '2026-03-20', '2026-04-01', null, '2026-04-01', '2026-05-01'];
  const asked = [3, 1, 3, 2, 3, 1, 2];
  const made: number[] = [];
  for (const [place, day] of days.entries()) {
    const { requestId } = await bench.request({
      projectId,
      request: {
        neededByAt: day === null ? null : new Date(`${day}T12:00:00Z`),
        submittedAt: new Date(`2026-02-0${asked[place] ?? 1}T09:00:00Z`),
      },
    });
    made.push(requestId);
  }
  const places: Readonly<Record<(typeof requestSorts)[number], readonly number[]>> = {
    'needed-by': [2, 1, 3, 5, 6, 0, 4],
    newest: [4, 2, 0, 6, 3, 5, 1],
    oldest: [1, 5, 3, 6, 0, 2, 4],
    number: [6, 5, 4, 3, 2, 1, 0],
  };
  for (const sort of requestSorts) {
    const found: number[] = [];
    let cursor: string | null = null;
    do {
      const page = await list({
        projectId,
        sort,
        limit: 2,
        ...(cursor === null ? {} : { cursor }),
      });
      expect(page.items.length).toBeLessThanOrEqual(2);
      found.push(...ids(page.items));
      cursor = page.nextCursor;
    } while (cursor !== null);
    expect([sort, found]).toEqual([sort, places[sort].map((place) => made[place])]);
  }
});

test('what is asked meanwhile neither repeats nor hides a row of the next page', async () => {
  await makeProject('Growing');
  const neededByAt = new Date('2026-04-01T12:00:00Z');
  const first = await bench.request({ projectId, request: { neededByAt } });
  const second = await bench.request({ projectId, request: { neededByAt } });
  const page = await list({ projectId, limit: 1 });
  await bench.request({ projectId, request: { neededByAt: new Date('2026-03-05T12:00:00Z') } });
  const next = await list({ projectId, limit: 1, cursor: page.nextCursor ?? '' });
  expect([...ids(page.items), ...ids(next.items)]).toEqual([first.requestId, second.requestId]);
  expect(next.nextCursor).toBeNull();
});

test('a cursor of another order, or none at all, is refused', async () => {
  await makeProject('Cursor');
  await bench.request({ projectId });
  await bench.request({ projectId });
  const { nextCursor } = await list({ projectId, limit: 1, sort: 'newest' });
  for (const cursor of [nextCursor ?? '', 'nonsense']) {
    const { status, problem } = await bench.app.callRefused(listRequests, bench.scheduler, {
      query: { projectId, sort: 'oldest', cursor },
    });
    expect(status).toBe(422);
    expect(problem.errors?.[0]?.pointer).toBe('#/query/cursor');
  }
});

test('state, kind, owner, day and text narrow the list', async () => {
  await makeProject('Marsh harrier');
  const odd = await buildCellType(bench.app.db, bench.scheduler.personId, { name: 'ZQ-77 100%' });
  const plain = await bench.request({
    projectId,
    request: { neededByAt: new Date('2026-03-31T22:30:00Z'), note: 'Straw_coloured box' },
  });
  const screening = await bench.request({
    projectId,
    cellTypeId: odd,
    request: {
      kind: 'screening',
      badToGoodRatio: 3,
      neededByAt: new Date('2026-03-31T23:30:00Z'),
    },
  });
  const theirs = await bench.request({
    projectId,
    requesterId: bench.scheduler.personId,
    request: { state: 'withdrawn' },
  });
  const found = async (query: Readonly<Record<string, string | number>>) =>
    ids((await list({ projectId, sort: 'number', ...query })).items).toReversed();
  const [a, b, c] = [plain.requestId, screening.requestId, theirs.requestId];

  expect(await found({})).toEqual([a, b, c]);
  expect(await found({ state: 'submitted' })).toEqual([a, b]);
  expect(await found({ state: 'withdrawn,draft' })).toEqual([c]);
  expect(await found({ kind: 'screening' })).toEqual([b]);
  expect(await found({ mine: 'true' })).toEqual([c]);
  expect(await found({ mine: 'false' })).toEqual([a, b, c]);
  // Clocks in Dublin went forward on 29 March: 23:30 UTC is 1 April there already.
  expect(await found({ neededBefore: '2026-04-01' })).toEqual([a]);
  expect(await found({ neededBefore: '2026-04-02' })).toEqual([a, b]);
  expect(await found({ text: 'harrier' })).toEqual([a, b, c]);
  expect(await found({ text: ' zq-77 ' })).toEqual([b]);
  expect(await found({ text: '100%' })).toEqual([b]);
  expect(await found({ text: 'straw_col' })).toEqual([a]);
  expect(await found({ text: 'strawXcol' })).toEqual([]);
  expect(await found({ text: String(b) })).toContain(b);
  expect(await found({ text: '99999999999999' })).toEqual([]);
});

test('a row says what there is: cells, types, proposal and bookings', async () => {
  await makeProject('Rows');
  const made = await bench.request({ projectId, cellCount: 2 });
  const asked = await bench.request({ projectId });
  const { placement } = await bench.offer(asked);
  await bench.app.call(proposeOffer, bench.engineer, {
    params: { id: asked.requestId, lotId: asked.lotId },
    body: { version: asked.version, offeredAt: '2026-03-02T08:00:00.000Z', placement },
  });
  const booking = await bench.book(made);
  const { items } = await list({ projectId, sort: 'number' });
  expect(items).toMatchObject([
    {
      id: asked.requestId,
      state: 'submitted',
      hasProposal: true,
      bookingIds: [],
      cellCount: 1,
    },
    {
      id: made.requestId,
      state: 'booked',
      requester: { name: 'Enid Engineer' },
      projectName: 'Rows',
      hasProposal: false,
      bookingIds: [booking.id],
      cellCount: 2,
      setTemperatureC: 25,
    },
  ]);
  expect(items[0]?.cellTypeNames).toHaveLength(1);
});

test('each sees their own and what their projects ask; only who keeps it sees a draft without project', async () => {
  await makeProject('Seen');
  const member = await bench.app.signInAs({ roles: ['engineer'] });
  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const { requestId } = await bench.request({ projectId });
  const draft = await bench.app.call(createRequest, stranger, { body: emptyForm });
  const seen = async (person: TestPerson) => ids((await list({ limit: 100 }, person)).items);

  expect(await seen(stranger)).toEqual([draft.body.id]);
  expect(await seen(member)).toEqual([]);
  expect(await seen(bench.engineer)).toContain(requestId);
  expect(await seen(bench.engineer)).not.toContain(draft.body.id);
  const forScheduler = await seen(bench.scheduler);
  expect(forScheduler).toContain(requestId);
  expect(forScheduler).not.toContain(draft.body.id);
});

test('another site lists none of it', async () => {
  const elsewhere = await bench.app.signInAs({ roles: ['scheduler@otterholm'] });
  const { body } = await bench.app.call(listRequests, elsewhere, {
    params: { site: 'otterholm' },
  });
  expect(body.items).toEqual([]);
});
