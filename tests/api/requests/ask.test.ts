import { randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { cellsTable } from '#server/db/tables/cell.table.ts';
import { outboxTable } from '#server/db/tables/outbox.table.ts';
import { projectsTable } from '#server/db/tables/project.table.ts';
import { requestLotCellsTable, requestsTable } from '#server/db/tables/request.table.ts';
import { listAuditEvents } from '#shared/contracts/audit.contract.ts';
import {
  createRequest,
  getRequest,
  submitRequest,
  updateRequest,
} from '#shared/contracts/requests.contract.ts';
import type { RequestFields } from '#shared/contracts/requests.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildCellType, buildProject } from '#tests/support/build-request.ts';
import { editOf, emptyForm, emptyLot, wholeForm } from '#tests/support/request-wish.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
});
afterAll(() => bench.app.stop());

const create = async (form: RequestFields) =>
  (await bench.app.call(createRequest, bench.engineer, { body: form })).body;
const whole = (change: Partial<RequestFields> = {}) => create(wholeForm(bench, change));
const submit = async (made: { readonly id: number; readonly version: number }) =>
  (
    await bench.app.call(submitRequest, bench.engineer, {
      params: { id: made.id },
      body: { version: made.version },
    })
  ).body;

test('an empty form is kept as a draft and read back as it was entered', async () => {
  const made = await create(emptyForm);
  expect(made).toMatchObject({
    state: 'draft',
    requester: { id: bench.engineer.personId, name: 'Enid Engineer' },
    project: null,
    setTemperatureC: null,
    createdAt: '2026-03-02T08:00:00.000Z',
    submittedAt: null,
    version: 1,
    lots: [{ cellTypeId: null, cellCount: null, cells: [], bookingId: null }],
  });
  const { body } = await bench.app.call(getRequest, bench.engineer, { params: { id: made.id } });
  expect(body).toEqual(made);
});

test('everything a form says comes back, also after a change', async () => {
  const form: RequestFields = {
    ...wholeForm(bench),
    kind: 'screening',
    grade: 'indicative',
    lots: [
      {
        ...emptyLot,
        cellTypeId: bench.cellTypeId,
        cellCount: 2,
        stateOfChargePct: 42.5,
        restedSinceAt: '2026-02-01T06:00:00.000Z',
        storageTemperatureC: 21.5,
        isDamaged: true,
      },
      { ...emptyLot, cellTypeId: bench.cellTypeId, cellCount: 1 },
    ],
    setTemperatureC: -9.75,
    setToleranceK: 0.25,
    tolerance: { kind: 'absolute', currentA: 2e-6 },
    badToGoodRatio: 4.5,
    earliestStartAt: '2026-03-10T08:00:00.000Z',
    neededByAt: '2026-03-30T16:00:00.000Z',
    maySplit: true,
    note: 'From the second delivery.',
  };
  const made = await create(form);
  expect(editOf(made)).toEqual({ ...form, version: 1 });
  const changed = { ...form, lots: form.lots.slice(1), note: 'From the third delivery.' };
  const { body } = await bench.app.call(updateRequest, bench.engineer, {
    params: { id: made.id },
    body: { ...changed, version: 1 },
  });
  expect(editOf(body)).toEqual({ ...changed, version: 2 });
  expect(body.lots.map(({ id }) => id)).toEqual([made.lots[0]?.id]);
});

test('submitting hands a whole draft over, announces its cells and leaves a trail', async () => {
  const auditor = await bench.app.signInAs({ roles: ['auditor'] });
  const made = await whole();
  const sent = await submit(made);
  expect(sent).toMatchObject({
    state: 'submitted',
    submittedAt: '2026-03-02T08:00:00.000Z',
    version: 2,
    lots: [{ cellIds: [], cellCount: 4 }],
  });
  expect(sent.lots[0]?.cells.map(({ serial }) => serial)).toEqual([null, null, null, null]);
  const trail = await bench.app.call(listAuditEvents, auditor, {
    query: { subjectKind: 'request', subjectId: made.id },
  });
  expect(trail.body.items.map(({ action, actor }) => [action, actor?.id])).toEqual([
    ['request.submit', bench.engineer.personId],
    ['request.create', bench.engineer.personId],
  ]);
  expect(trail.body.items[0]).toMatchObject({
    before: { state: 'draft' },
    after: { state: 'submitted' },
  });
  expect(await bench.app.db.select().from(outboxTable)).toEqual([]);
});

test('what a draft lacks is named field by field, and it stays a draft', async () => {
  const made = await create({ ...emptyForm, lots: [emptyLot, emptyLot] });
  const { status, problem } = await bench.app.callRefused(submitRequest, bench.engineer, {
    params: { id: made.id },
    body: { version: 1 },
  });
  expect([status, problem.code]).toEqual([422, 'request.incomplete']);
  expect(problem.detail).toBe(
    `Request ${made.id} lacks the project and the set temperature and the cell type and the number of cells. Add it, then submit again.`,
  );
  expect(problem.errors).toEqual([
    { pointer: '#/projectId', detail: 'Add the project.' },
    { pointer: '#/setTemperatureC', detail: 'Add the set temperature.' },
    { pointer: '#/lots/0/cellTypeId', detail: 'Add the cell type.' },
    { pointer: '#/lots/0/cellCount', detail: 'Add the number of cells.' },
    { pointer: '#/lots/1/cellTypeId', detail: 'Add the cell type.' },
    { pointer: '#/lots/1/cellCount', detail: 'Add the number of cells.' },
  ]);
  const { body } = await bench.app.call(getRequest, bench.engineer, { params: { id: made.id } });
  expect(body).toEqual(made);
});

test('a submitted request can be changed, but not made incomplete', async () => {
  const sent = await submit(await whole());
  const { status, problem } = await bench.app.callRefused(updateRequest, bench.engineer, {
    params: { id: sent.id },
    body: editOf(sent, { setTemperatureC: null }),
  });
  expect(status).toBe(422);
  expect(problem.errors).toEqual([
    { pointer: '#/setTemperatureC', detail: 'Add the set temperature.' },
  ]);
  const { body } = await bench.app.call(updateRequest, bench.engineer, {
    params: { id: sent.id },
    body: editOf(sent, {
      setTemperatureC: 45,
      lots: [{ ...emptyLot, cellTypeId: bench.cellTypeId, cellCount: 6 }],
    }),
  });
  expect(body).toMatchObject({ state: 'submitted', setTemperatureC: 45, version: 3 });
  expect(body.lots[0]?.cells).toHaveLength(6);
});

test('announced cells follow the type and project the request asks for now', async () => {
  const other = await buildCellType(bench.app.db, bench.scheduler.personId);
  const sent = await submit(await whole());
  const { body } = await bench.app.call(updateRequest, bench.engineer, {
    params: { id: sent.id },
    body: editOf(sent, { lots: [{ ...emptyLot, cellTypeId: other, cellCount: 2 }] }),
  });
  const cells = await bench.app.db
    .select({ cellTypeId: cellsTable.cellTypeId, status: cellsTable.status })
    .from(cellsTable)
    .innerJoin(requestLotCellsTable, eq(requestLotCellsTable.cellId, cellsTable.id))
    .where(eq(requestLotCellsTable.lotId, body.lots[0]?.id ?? 0));
  expect(cells).toEqual([
    { cellTypeId: other, status: 'announced' },
    { cellTypeId: other, status: 'announced' },
  ]);
});

test('named cells are kept in place of a number', async () => {
  const { cellIds } = await bench.request({ cellCount: 2 });
  const made = await whole({
    lots: [{ ...emptyLot, cellTypeId: bench.cellTypeId, cellIds: [...cellIds] }],
  });
  expect(made.lots[0]).toMatchObject({ cellIds, cellCount: 2 });
  const sent = await submit(made);
  expect(sent.lots[0]).toMatchObject({ cellIds, cellCount: 2 });
});

test('every senseless entry is named at its field', async () => {
  const db = bench.app.db;
  const closed = await buildProject(db, [bench.engineer.personId]);
  await db
    .update(projectsTable)
    .set({ closedAt: new Date('2026-01-01T00:00:00Z') })
    .where(eq(projectsTable.id, closed));
  const foreign = await buildProject(db, []);
  const otherType = await buildCellType(db, bench.scheduler.personId);
  const { cellIds } = await bench.request({ cellCount: 2 });
  const [first = 0, second = 0] = cellIds;
  const lot = { ...emptyLot, cellTypeId: bench.cellTypeId };
  const faultsOf = async (change: Partial<RequestFields>) => {
    const { status, problem } = await bench.app.callRefused(createRequest, bench.engineer, {
      body: wholeForm(bench, change),
    });
    expect([status, problem.code]).toEqual([422, 'input.invalid']);
    return problem.errors?.map(({ pointer }) => pointer);
  };
  expect(
    await faultsOf({
      earliestStartAt: '2026-03-10T08:00:00Z',
      neededByAt: '2026-03-10T08:00:00Z',
    }),
  ).toEqual(['#/neededByAt']);
  expect(await faultsOf({ projectId: closed })).toEqual(['#/projectId']);
  expect(await faultsOf({ projectId: foreign })).toEqual(['#/projectId']);
  expect(await faultsOf({ projectId: 987_654 })).toEqual(['#/projectId']);
  expect(await faultsOf({ lots: [{ ...lot, cellTypeId: 987_654 }] })).toEqual([
    '#/lots/0/cellTypeId',
  ]);
  expect(await faultsOf({ lots: [{ ...lot, cellTypeId: otherType, cellIds: [first] }] })).toEqual([
    '#/lots/0/cellIds',
  ]);
  expect(await faultsOf({ lots: [{ ...lot, cellIds: [987_654] }] })).toEqual(['#/lots/0/cellIds']);
  expect(
    await faultsOf({ lots: [lot, { ...lot, cellIds: [first, second], cellCount: 3 }] }),
  ).toEqual(['#/lots/1/cellCount']);
  expect(
    await faultsOf({
      lots: [
        { ...lot, cellIds: [first] },
        { ...lot, cellIds: [first] },
      ],
    }),
  ).toEqual(['#/lots/0/cellIds', '#/lots/1/cellIds']);
});

test.each([
  ['a tolerance beyond its bounds', { tolerance: { kind: 'relative', fraction: 0.6 } }],
  ['a ratio that tells nothing apart', { badToGoodRatio: 1 }],
  ['no lot at all', { lots: [] }],
  ['a lot of no cells', { lots: [{ ...emptyLot, cellCount: 0 }] }],
  ['a temperature no chamber reaches', { setTemperatureC: 200 }],
])('%s is no form', async (_what, change) => {
  const { status, problem } = await bench.app.callRefused(createRequest, bench.engineer, {
    body: { ...wholeForm(bench), ...change },
  });
  expect([status, problem.code]).toEqual([422, 'input.invalid']);
  expect(problem.errors?.[0]?.pointer).toContain(`#/${Object.keys(change)[0] ?? ''}`);
});

test('a scheduler asks for any open project, others only for their own', async () => {
  const foreign = await buildProject(bench.app.db, []);
  const { body } = await bench.app.call(createRequest, bench.scheduler, {
    body: wholeForm({ ...bench, projectId: foreign }),
  });
  expect(body.project?.id).toBe(foreign);
});

test('who did not ask changes nothing: strangers do not see it, colleagues and schedulers are refused', async () => {
  const { db } = bench.app;
  const made = await whole();
  const colleague = await bench.app.signInAs({ roles: ['engineer'] });
  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const elsewhere = await bench.app.signInAs({ roles: ['scheduler@otterholm'] });
  const shared = await buildProject(db, [bench.engineer.personId, colleague.personId]);
  await db.update(requestsTable).set({ projectId: shared }).where(eq(requestsTable.id, made.id));
  const change = { params: { id: made.id }, body: editOf(made, { projectId: shared }) };
  const send = { params: { id: made.id }, body: { version: 1 } };
  const refusals = await Promise.all([
    bench.app.callRefused(updateRequest, colleague, change),
    bench.app.callRefused(submitRequest, colleague, send),
    bench.app.callRefused(updateRequest, bench.scheduler, change),
    bench.app.callRefused(updateRequest, stranger, change),
    bench.app.callRefused(submitRequest, stranger, send),
    bench.app.callRefused(getRequest, stranger, { params: { id: made.id } }),
    bench.app.callRefused(getRequest, elsewhere, {
      params: { site: 'otterholm', id: made.id },
    }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([403, 403, 403, 404, 404, 404, 404]);
  const read = await bench.app.call(getRequest, colleague, { params: { id: made.id } });
  expect(read.body.project?.id).toBe(shared);
});

test('a draft without project is seen by nobody but who keeps it', async () => {
  const made = await create(emptyForm);
  const refused = await bench.app.callRefused(getRequest, bench.scheduler, {
    params: { id: made.id },
  });
  expect(refused.status).toBe(404);
});

test('who saves over a newer version is shown the current one', async () => {
  const made = await whole();
  await bench.app.call(updateRequest, bench.engineer, {
    params: { id: made.id },
    body: editOf(made, { note: 'first' }),
  });
  for (const [contract, body] of [
    [updateRequest, editOf(made, { note: 'second' })],
    [submitRequest, { version: 1 }],
  ] as const) {
    const { status, problem } = await bench.app.callRefused(contract, bench.engineer, {
      params: { id: made.id },
      body,
    });
    expect([status, problem.code]).toEqual([409, 'version.stale']);
    expect(problem).toMatchObject({ current: { note: 'first', version: 2 } });
  }
});

test('of two who submit at once one does, the other is told', async () => {
  const made = await whole();
  const answers = await Promise.all(
    [1, 2].map(() =>
      bench.app.send(submitRequest, bench.engineer, {
        params: { id: made.id },
        body: { version: 1 },
      }),
    ),
  );
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  const { body } = await bench.app.call(getRequest, bench.engineer, { params: { id: made.id } });
  expect(body.lots[0]?.cells).toHaveLength(4);
});

test('a repeat under the same key makes no second request and announces no second cells', async () => {
  const key = { idempotencyKey: randomUUID() };
  const first = await bench.app.call(createRequest, bench.engineer, {
    ...key,
    body: wholeForm(bench),
  });
  const again = await bench.app.call(createRequest, bench.engineer, {
    ...key,
    body: wholeForm(bench),
  });
  expect(again.body).toEqual(first.body);
  const sending = {
    params: { id: first.body.id },
    body: { version: 1 },
    idempotencyKey: randomUUID(),
  };
  const sent = await bench.app.call(submitRequest, bench.engineer, sending);
  const resent = await bench.app.call(submitRequest, bench.engineer, sending);
  expect(resent.body).toEqual(sent.body);
  expect(sent.body.lots[0]?.cells).toHaveLength(4);
});

test('what is submitted already is not submitted again', async () => {
  const sent = await submit(await whole());
  const { status, problem } = await bench.app.callRefused(submitRequest, bench.engineer, {
    params: { id: sent.id },
    body: { version: sent.version },
  });
  expect([status, problem.code]).toEqual([409, 'request.state']);
  expect(problem.detail).toContain('with the schedulers already');
});
