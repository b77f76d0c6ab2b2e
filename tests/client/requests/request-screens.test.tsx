// @vitest-environment happy-dom
import { QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { z } from 'zod';
import type { OfferDto, OffersDto } from '#shared/contracts/offers.contract.ts';
import type { ProblemCode } from '#shared/contracts/problems.ts';
import { requestFields, type RequestDto } from '#shared/contracts/requests.contract.ts';
import {
  EditRequestPage,
  NewRequestPage,
} from '#src/features/request/components/request-form-page.tsx';
import { RequestPage } from '#src/features/request/components/request-page.tsx';
import { SiteContext, type SiteContextValue } from '#src/hooks/use-site.ts';
import { createQueryClient } from '#src/lib/query-client.ts';

const site: SiteContextValue = {
  code: 'larkfen',
  name: 'Larkfen',
  zone: 'Europe/Dublin',
  roles: ['engineer', 'scheduler'],
  actor: {
    personId: 4,
    grants: [
      { role: 'engineer', siteCode: 'larkfen' },
      { role: 'scheduler', siteCode: 'larkfen' },
    ],
    projectIds: [3],
  },
  personName: 'B. Hallowe',
};

const request: RequestDto = {
  id: 1187,
  site: 'larkfen',
  state: 'submitted',
  requester: { id: 4, name: 'B. Hallowe' },
  project: { id: 3, name: 'Anvil traction modules' },
  kind: 'settled',
  grade: 'reported',
  lots: [
    {
      id: 21,
      cellTypeId: 7,
      cellTypeName: 'NP35',
      cellIds: [],
      cellCount: 2,
      stateOfChargePct: 50,
      restedSinceAt: null,
      storageTemperatureC: null,
      isDamaged: false,
      cells: [],
      bookingId: null,
    },
  ],
  setTemperatureC: 45,
  setToleranceK: 0.5,
  tolerance: { kind: 'relative', fraction: 0.1 },
  badToGoodRatio: 3,
  earliestStartAt: null,
  neededByAt: null,
  maySplit: false,
  note: 'as agreed',
  priority: 'normal',
  declineReason: null,
  withdrawReason: null,
  proposal: null,
  createdAt: '2026-06-01T09:00:00.000Z',
  submittedAt: '2026-06-02T09:00:00.000Z',
  version: 3,
};

const slot: OfferDto = {
  placement: {
    chamberTag: 'C07',
    startAt: '2026-06-18T15:45:00.000Z',
    setTemperatureC: 45,
    joinsLoadId: null,
    paths: [
      { panelId: 1, sourceUnitId: 11, meterUnitId: 12, meterRangeId: 13, positionUnitId: 14 },
    ],
  },
  startAt: '2026-06-18T15:45:00.000Z',
  endAt: '2026-06-19T07:30:00.000Z',
  chamberTag: 'C07',
  joinsLoadId: null,
  setTemperatureC: 45,
  paths: [],
  phases: [],
  waitS: 0,
  estimate: { outcome: 'unknown', modelVersion: '1', figures: [], notes: [], reason: 'none' },
  checks: [],
  remark: 'Settles overnight.',
};
const found: OffersDto = {
  lotId: 21,
  offeredAt: '2026-06-16T09:40:00.000Z',
  expiresAt: '2026-06-16T09:50:00.000Z',
  startsLookedAt: 2140,
  offers: [slot],
  blockedEarlier: null,
  reasons: [],
  mayConfirm: true,
};

const api = '/api/sites/larkfen';
type Answer = { readonly status: number; readonly body: unknown };
const ok = (body: unknown): Answer => ({ status: 200, body });
const refusal = (code: ProblemCode, detail: string): Answer => ({
  status: 409,
  body: {
    type: `/problems/${code}`,
    title: 'Refused',
    status: 409,
    detail,
    instance: 'r-1',
    code,
  },
});

/** What the server says to each call; a call that a test did not foresee fails the test. */
let answers: Map<string, Answer>;
let sent: { readonly call: string; readonly body: unknown }[];

beforeEach(() => {
  sessionStorage.clear();
  sent = [];
  answers = new Map([
    [`GET ${api}/cell-types`, ok({ items: [] })],
    [`GET ${api}/projects`, ok({ items: [] })],
    [
      `GET ${api}/waterline`,
      ok({ at: request.createdAt, positionsTaken: 0, positions: 0, vessels: [] }),
    ],
    [
      `GET ${api}/estimate-basis`,
      ok({
        wiring: {
          label: 'reference wiring of Larkfen',
          leadResistanceOhm: 0.02,
          sourceOutputOhm: 0.002,
          burdenOhm: 0,
          burdenInsideLoop: true,
          meterNoiseA: 2e-9,
          meterResolutionA: 1e-9,
          sampleIntervalS: 1,
        },
        process: {
          connectFixedMin: 10,
          connectPerCellMin: 3,
          unloadFixedMin: 10,
          unloadPerCellMin: 3,
          recabledPaths: 0,
          recableMinPerPath: 5,
          matchMin: 20,
          matchAttended: false,
          minimumMeasureMin: 60,
          safePercentile: 0.9,
        },
        chamber: { idleTemperatureC: 25, rampKPerMin: 1 },
        holderFactor: 1,
        learnedRatios: null,
        staffedHours: 'Mon to Fri 08:00-18:00',
        zone: site.zone,
      }),
    ],
    [`GET ${api}/requests/1187`, ok(request)],
    [`GET ${api}/requests/1187/deviations`, ok({ items: [] })],
    [`GET ${api}/requests/1187/lots/21/offers`, ok(found)],
  ]);
  vi.stubGlobal('fetch', (address: string, init: RequestInit) => {
    const call = `${init.method ?? 'GET'} ${address.split('?')[0] ?? ''}`;
    const body: unknown = typeof init.body === 'string' ? JSON.parse(init.body) : null;
    sent.push({ call, body });
    const answer = answers.get(call);
    if (answer === undefined) {
      throw new Error(`Nobody expected ${call}.`);
    }
    return Promise.resolve(new Response(JSON.stringify(answer.body), { status: answer.status }));
  });
});

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function open(address: string) {
  const router = createMemoryRouter(
    [
      { path: '/:site/requests', element: <p>the list</p> },
      { path: '/:site/requests/new', element: <NewRequestPage /> },
      { path: '/:site/requests/:id', element: <RequestPage /> },
      { path: '/:site/requests/:id/edit', element: <EditRequestPage /> },
      { path: '/:site/bookings/:id', element: <p>the booking</p> },
    ],
    { initialEntries: [address] },
  );
  render(
    <QueryClientProvider client={createQueryClient()}>
      <SiteContext value={site}>
        <RouterProvider router={router} />
      </SiteContext>
    </QueryClientProvider>,
  );
  return router;
}

const calls = (call: string) => sent.filter((each) => each.call === call);
const versionOf = (body: unknown) => z.object({ version: z.int() }).parse(body).version;

describe('the form of a new request', () => {
  test('has what was typed when it is opened again, and gives it up when asked', async () => {
    open('/larkfen/requests/new');
    await userEvent.type(screen.getByRole('textbox', { name: 'Cells' }), '6');
    cleanup();
    open('/larkfen/requests/new');
    expect(screen.getByRole('textbox', { name: 'Cells' })).toHaveProperty('value', '6');
    await userEvent.click(screen.getByRole('button', { name: 'Start afresh' }));
    expect(screen.getByRole('textbox', { name: 'Cells' })).toHaveProperty('value', '');
  });

  test('asks before it is left with something typed, and not without', async () => {
    const untouched = open('/larkfen/requests/new');
    await userEvent.click(screen.getByRole('link', { name: 'Leave without saving' }));
    expect(untouched.state.location.pathname).toBe('/larkfen/requests');
    cleanup();
    const router = open('/larkfen/requests/new');
    await userEvent.type(screen.getByRole('textbox', { name: /^Note/ }), 'careful');
    await userEvent.click(screen.getByRole('link', { name: 'Leave without saving' }));
    expect(router.state.location.pathname).toBe('/larkfen/requests/new');
    await userEvent.click(screen.getByRole('button', { name: 'Stay here' }));
    expect(screen.getByRole('textbox', { name: /^Note/ })).toHaveProperty('value', 'careful');
  });

  test('sends nothing it cannot read, and puts the cursor where the fault is', async () => {
    open('/larkfen/requests/new');
    const temperature = screen.getByRole('textbox', { name: 'Set temperature' });
    await userEvent.clear(temperature);
    await userEvent.type(temperature, 'warm');
    await userEvent.click(screen.getByRole('button', { name: 'Save and look for slots' }));
    expect(document.activeElement).toBe(temperature);
    expect(temperature.getAttribute('aria-invalid')).toBe('true');
    expect(calls(`POST ${api}/requests`)).toEqual([]);
  });

  test('shows a fault that only the server sees at its field, with everything still typed', async () => {
    answers.set(`POST ${api}/requests`, {
      status: 422,
      body: {
        type: '/problems/input.invalid',
        title: 'Some of the input cannot be accepted',
        status: 422,
        detail: 'It is needed before it may start. Give a later day, or an earlier start.',
        instance: 'r-2',
        code: 'input.invalid',
        errors: [{ pointer: '#/neededByAt', detail: 'It is needed before it may start.' }],
      },
    });
    open('/larkfen/requests/new');
    await userEvent.type(screen.getByRole('textbox', { name: 'Cells' }), '6');
    await userEvent.click(screen.getByRole('button', { name: 'Save and look for slots' }));
    const neededBy = await screen.findByLabelText(/^Needed by/);
    await waitFor(() => {
      expect(neededBy.getAttribute('aria-invalid')).toBe('true');
    });
    expect(screen.getByRole('textbox', { name: 'Cells' })).toHaveProperty('value', '6');
  });

  test('is kept no longer once it is saved', async () => {
    answers.set(`POST ${api}/requests`, { status: 201, body: { ...request, state: 'draft' } });
    const router = open('/larkfen/requests/new');
    await userEvent.type(screen.getByRole('textbox', { name: 'Cells' }), '6');
    await userEvent.click(screen.getByRole('button', { name: 'Save and look for slots' }));
    await waitFor(() => {
      expect(router.state.location.pathname).toBe('/larkfen/requests/1187');
    });
    expect(requestFields.parse(calls(`POST ${api}/requests`)[0]?.body).lots[0]?.cellCount).toBe(6);
    expect(sessionStorage.length).toBe(0);
  });
});

describe('a request that somebody else changes meanwhile', () => {
  const put = `PUT ${api}/requests/1187`;

  test('keeps what was typed and saves it only after a decision', async () => {
    open('/larkfen/requests/1187/edit');
    const note = await screen.findByRole('textbox', { name: /^Note/ });
    await userEvent.clear(note);
    await userEvent.type(note, 'mine');
    answers.set(put, refusal('version.stale', 'Somebody changed request 1187 meanwhile.'));
    answers.set(`GET ${api}/requests/1187`, ok({ ...request, version: 4, note: 'theirs' }));
    await userEvent.click(screen.getByRole('button', { name: 'Save the changes' }));
    await userEvent.click(await screen.findByRole('button', { name: 'Keep what I typed' }));
    expect(screen.getByRole('textbox', { name: /^Note/ })).toHaveProperty('value', 'mine');
    answers.set(put, ok({ ...request, version: 5, note: 'mine' }));
    await userEvent.click(screen.getByRole('button', { name: 'Save the changes' }));
    await waitFor(() => {
      expect(calls(put).map(({ body }) => versionOf(body))).toEqual([3, 4]);
    });
    expect(requestFields.loose().parse(calls(put)[1]?.body).note).toBe('mine');
  });

  test('can be taken as it was saved instead', async () => {
    open('/larkfen/requests/1187/edit');
    await userEvent.type(await screen.findByRole('textbox', { name: /^Note/ }), ' mine');
    answers.set(put, refusal('version.stale', 'Somebody changed request 1187 meanwhile.'));
    answers.set(`GET ${api}/requests/1187`, ok({ ...request, version: 4, note: 'theirs' }));
    await userEvent.click(screen.getByRole('button', { name: 'Save the changes' }));
    await userEvent.click(await screen.findByRole('button', { name: 'Take the saved version' }));
    expect(screen.getByRole('textbox', { name: /^Note/ })).toHaveProperty('value', 'theirs');
  });
});

describe('the page of a request', () => {
  test('says who was quicker although the lot is gone from the list by then', async () => {
    const router = open('/larkfen/requests/1187');
    await userEvent.click(await screen.findByRole('button', { name: 'Book this' }));
    const taken = 'S06/1 is taken by booking 2418 until Fri 19 Jun 08:30.';
    answers.set(`POST ${api}/bookings`, refusal('booking.clash', taken));
    const lots = request.lots.map((lot) => ({ ...lot, bookingId: 2418 }));
    answers.set(`GET ${api}/requests/1187`, ok({ ...request, state: 'booked', version: 4, lots }));
    const dialog = screen.getByRole('dialog');
    await userEvent.click(within(dialog).getByRole('button', { name: 'Book in C07' }));
    await screen.findByRole('link', { name: 'Booking 2418' });
    expect(screen.queryByRole('button', { name: 'Book this' })).toBeNull();
    expect(within(screen.getByRole('dialog')).getByRole('alert').textContent).toContain(taken);
    expect(router.state.location.pathname).toBe('/larkfen/requests/1187');
  });

  test('keeps a reason that was typed when taking back is refused', async () => {
    open('/larkfen/requests/1187');
    await userEvent.click(await screen.findByRole('button', { name: 'Withdraw' }));
    const dialog = screen.getByRole('dialog');
    await userEvent.type(within(dialog).getByRole('textbox'), 'no longer needed');
    answers.set(
      `POST ${api}/requests/1187/withdraw`,
      refusal('version.stale', 'Somebody changed request 1187 meanwhile.'),
    );
    answers.set(`GET ${api}/requests/1187`, ok({ ...request, version: 4 }));
    await userEvent.click(within(dialog).getByRole('button', { name: 'Withdraw' }));
    const alert = await within(dialog).findByRole('alert');
    expect(alert.textContent).toContain('Somebody changed request 1187 meanwhile.');
    expect(within(dialog).getByRole('textbox')).toHaveProperty('value', 'no longer needed');
  });

  test('offers its reasons instead of an empty list where no slot is found', async () => {
    const reasons = [
      {
        code: 'stability-logged',
        sentence: 'No stability log of C04 lies within ±0.5 K of 50 °C.',
        chambers: ['C03', 'C04'],
      },
    ];
    answers.set(`GET ${api}/requests/1187/lots/21/offers`, ok({ ...found, offers: [], reasons }));
    open('/larkfen/requests/1187');
    const sentence = await screen.findByText(/No stability log of C04/);
    expect(sentence.textContent).toContain('C03, C04');
    expect(screen.queryByRole('table', { name: 'Earliest slots' })).toBeNull();
  });

  test('offers nothing to take to somebody who may only look', async () => {
    answers.set(
      `GET ${api}/requests/1187`,
      ok({ ...request, requester: { id: 9, name: 'E. C.' } }),
    );
    answers.set(`GET ${api}/requests/1187/lots/21/offers`, ok({ ...found, mayConfirm: false }));
    open('/larkfen/requests/1187');
    await screen.findByText('Settles overnight.');
    expect(screen.queryByRole('button', { name: /Book|Ask for this|Change/ })).toBeNull();
  });
});
