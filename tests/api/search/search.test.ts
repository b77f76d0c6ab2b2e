import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { cellsTable } from '#server/db/tables/cell.table.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';
import { searchSite } from '#shared/contracts/board.contract.ts';
import type { BookingDto } from '#shared/contracts/bookings.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildInstrument } from '#tests/support/build-instrument.ts';
import type { BuiltRequest } from '#tests/support/build-request.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestPerson } from '#tests/support/test-people.ts';

let bench: Bench;
let stranger: TestPerson;
let request: BuiltRequest;
let booking: BookingDto;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  stranger = await bench.app.signInAs({ roles: ['engineer'] });
  // Apart from each other, so that one number names one record.
  for (let each = 0; each < 3; each += 1) {
    request = await bench.request();
  }
  booking = await bench.book(request, { startAt: '2026-03-05T09:00:00.000Z' });
  const { db } = bench.app;
  await buildInstrument(db, {
    tag: 'S88',
    kind: 'source',
    siteId: bench.keepers.siteId,
    model: 'quiet source 100%',
    serial: 'QS-2204-17',
  });
  const [otterholm] = await db.select().from(sitesTable).where(eq(sitesTable.code, 'otterholm'));
  await buildInstrument(db, {
    tag: 'S89',
    kind: 'source',
    siteId: otterholm?.id ?? 0,
    serial: 'QS-2204-18',
  });
});
afterAll(() => bench.app.stop());

async function find(text: string, person = bench.engineer) {
  const { body } = await bench.app.call(searchSite, person, { query: { text } });
  return body.hits;
}

test('a tag leads to its instrument, also by channel or position, in any case of letters', async () => {
  const tag = bench.chamber.chamberTag;
  const hit = {
    kind: 'instrument',
    label: tag,
    detail: 'chamber, bench',
    href: `/equipment/${tag}`,
  };
  expect(await find(tag)).toEqual([hit]);
  expect(await find(` ${tag.toLowerCase()}/4 `)).toEqual([hit]);
});

test('a serial or model is found at this site only, and signs stand for themselves', async () => {
  const hit = {
    kind: 'instrument',
    label: 'S88',
    detail: 'source, quiet source 100%',
    href: '/equipment/S88',
  };
  expect(await find('qs-2204')).toEqual([hit]);
  expect(await find('100%')).toEqual([hit]);
  expect(await find('%')).toEqual([hit]);
  expect(await find('QS_2204')).toEqual([]);
});

test('a cell is found by its serial by who sees its project, and leads to its request', async () => {
  const [cell] = await bench.app.db
    .select()
    .from(cellsTable)
    .where(eq(cellsTable.id, request.cellIds[0] ?? 0));
  const serial = cell?.serial ?? '';
  expect(await find(serial)).toMatchObject([
    { kind: 'cell', label: serial, href: `/requests/${request.requestId}` },
  ]);
  expect(await find(serial, bench.scheduler)).toHaveLength(1);
  expect(await find(serial, stranger)).toEqual([]);
});

test('a request and a booking are found by number, by who may see them', async () => {
  expect(booking.id).not.toBe(request.requestId);
  const requestHit = {
    kind: 'request',
    label: `request ${request.requestId}`,
    href: `/requests/${request.requestId}`,
  };
  expect(await find(`request ${request.requestId}`)).toMatchObject([requestHit]);
  const number = await find(String(request.requestId));
  expect(number.map(({ kind }) => kind)).toContain('request');
  expect(await find(`Booking ${booking.id}`)).toEqual([
    {
      kind: 'booking',
      label: `booking ${booking.id}`,
      detail: `confirmed, ${bench.chamber.chamberTag}, Thu 5 Mar 09:00`,
      href: `/bookings/${booking.id}`,
    },
  ]);
  expect(await find(`request ${request.requestId}`, stranger)).toEqual([]);
  expect(await find(`booking ${booking.id}`, stranger)).toEqual([]);
  expect(await find('booking 999999999')).toEqual([]);
});

test('a calibration is found by certificate or number', async () => {
  const certificate = `N-${bench.chamber.chamberId}`;
  const hits = await find(certificate);
  const own = hits.find(({ detail }) => detail.startsWith(bench.chamber.chamberTag));
  expect(own).toMatchObject({
    kind: 'calibration',
    detail: `${bench.chamber.chamberTag}, ${certificate}, performed 2026-01-10`,
  });
  const label = own?.label ?? '';
  expect(label).toMatch(/^calibration \d+$/);
  expect(await find(label)).toEqual([own]);
});

test('nothing that matches is an empty answer; no text is refused; another site is not there', async () => {
  expect(await find('nowhere at all')).toEqual([]);
  const empty = await bench.app.callRefused(searchSite, bench.engineer, { query: { text: '  ' } });
  expect(empty.status).toBe(422);
  const away = await bench.app.callRefused(searchSite, bench.engineer, {
    params: { site: 'otterholm' },
    query: { text: 'S89' },
  });
  expect(away.status).toBe(404);
});
