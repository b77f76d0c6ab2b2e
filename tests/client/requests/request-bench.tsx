import { QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render } from '@testing-library/react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { afterEach, beforeEach, vi } from 'vitest';
import type { OfferDto, OffersDto } from '#shared/contracts/offers.contract.ts';
import type { ProblemCode } from '#shared/contracts/problems.ts';
import type { RequestDto } from '#shared/contracts/requests.contract.ts';
import {
  EditRequestPage,
  NewRequestPage,
} from '#src/features/request/components/request-form-page.tsx';
import { RequestPage } from '#src/features/request/components/request-page.tsx';
import { SiteContext, type SiteContextValue } from '#src/hooks/use-site.ts';
import { createQueryClient } from '#src/lib/query-client.ts';

export const site: SiteContextValue = {
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

export const request: RequestDto = {
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

export const slot: OfferDto = {
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
export const found: OffersDto = {
  lotId: 21,
  offeredAt: '2026-06-16T09:40:00.000Z',
  expiresAt: '2026-06-16T09:50:00.000Z',
  startsLookedAt: 2140,
  offers: [slot],
  blockedEarlier: null,
  reasons: [],
  mayConfirm: true,
};

export const api = '/api/sites/larkfen';
type Answer = { readonly status: number; readonly body: unknown };
export const ok = (body: unknown): Answer => ({ status: 200, body });
export const refusal = (code: ProblemCode, detail: string): Answer => ({
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

/** What the server says to each call; one that a test did not foresee fails it. */
export const answers = new Map<string, Answer>();
let sent: { readonly call: string; readonly body: unknown }[];

const foreseen: readonly (readonly [string, Answer])[] = [
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
];

/** A server of which each test says the answers; call it once at the top of a test file. */
export function stubServer(): void {
  beforeEach(() => {
    sessionStorage.clear();
    sent = [];
    answers.clear();
    for (const [call, answer] of foreseen) {
      answers.set(call, answer);
    }
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
}

/** Opens a page of requests at its address, with the pages it leads to. */
export function open(address: string, person: SiteContextValue = site) {
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
      <SiteContext value={person}>
        <RouterProvider router={router} />
      </SiteContext>
    </QueryClientProvider>,
  );
  return router;
}

export const calls = (call: string) => sent.filter((each) => each.call === call);
