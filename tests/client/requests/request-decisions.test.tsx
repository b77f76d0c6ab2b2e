// @vitest-environment happy-dom
import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, test } from 'vitest';
import { confirmBooking } from '#shared/contracts/bookings.contract.ts';
import type { CheckResultDto } from '#shared/contracts/check.schemas.ts';
import { checkPlacement, proposeOffer } from '#shared/contracts/offers.contract.ts';
import {
  askDeviation,
  decideDeviation,
  type DeviationDto,
} from '#shared/contracts/registers.contract.ts';
import {
  answers,
  api,
  calls,
  found,
  ok,
  open,
  refusal,
  request,
  site,
  slot,
  stubServer,
} from './request-bench.tsx';

stubServer();

const stop: CheckResultDto = {
  code: 'stability-logged',
  outcome: 'stop',
  sentence: 'The last log of C02 is 97 days old, the limit is 90.',
  evidence: [],
  waysOut: [
    { kind: 'assess-log', sentence: 'Judge a new log of C02.', subject: 'C02' },
    { kind: 'deviation', sentence: 'Ask for a deviation.', subject: 'stability-logged' },
  ],
  used: null,
  liftedByDeviationId: null,
};
const deviation: DeviationDto = {
  id: 31,
  requestId: request.id,
  code: 'stability-logged',
  state: 'asked',
  reason: 'The logs before and after are quiet.',
  customerAcceptance: null,
  askedBy: 'E. Crandle',
  askedAt: '2026-06-16T09:00:00.000Z',
  decidedBy: null,
  decidedAt: null,
  decisionReason: null,
  expiresAt: null,
};
const checks = `POST ${api}/requests/1187/lots/21/checks`;
const offers = `GET ${api}/requests/1187/lots/21/offers`;

async function placeByForm(chamber: string, start: string) {
  await userEvent.type(await screen.findByLabelText('Chamber'), chamber);
  await userEvent.type(screen.getByLabelText('Start'), start);
  await userEvent.click(screen.getByRole('button', { name: 'Check this place' }));
}

describe('booking by form', () => {
  test('runs the checks for the place and time of the site, then books what was checked', async () => {
    answers.set(checks, ok({ offer: slot, reason: null, offeredAt: found.offeredAt }));
    answers.set(`POST ${api}/bookings`, refusal('booking.horizon', 'Too far ahead. Choose June.'));
    open('/larkfen/requests/1187');
    await placeByForm('c07', '2026-06-18T16:45');
    await userEvent.click(await screen.findByRole('button', { name: 'Book this place' }));
    expect(checkPlacement.body.parse(calls(checks)[0]?.body)).toEqual({
      chamberTag: 'C07',
      startAt: '2026-06-18T15:45:00.000Z',
    });
    const dialog = screen.getByRole('dialog');
    await userEvent.click(within(dialog).getByRole('button', { name: 'Book in C07' }));
    expect((await within(dialog).findByRole('alert')).textContent).toContain('Too far ahead.');
    expect(confirmBooking.body.parse(calls(`POST ${api}/bookings`)[0]?.body)).toEqual({
      requestId: 1187,
      lotId: 21,
      requestVersion: 3,
      placement: slot.placement,
    });
  });

  test('does not book a place that a rule stops, or one that was changed after the checks', async () => {
    answers.set(
      checks,
      ok({
        offer: { ...slot, checks: [stop] },
        reason: null,
        offeredAt: '2026-06-16T09:40:00.000Z',
      }),
    );
    open('/larkfen/requests/1187');
    await placeByForm('C02', '2026-06-18T16:45');
    await screen.findByRole('button', { name: 'Book this place: 1 rule stops it' });
    expect(screen.getByText(stop.sentence)).toBeDefined();
    await userEvent.type(screen.getByLabelText('Chamber'), '1');
    await screen.findByRole('button', { name: 'Book this place: check the place first' });
    expect(screen.queryByText(stop.sentence)).toBeNull();
  });

  test('says why nothing can be placed there at all', async () => {
    answers.set(
      checks,
      ok({ offer: null, reason: 'There is no chamber C99 here.', offeredAt: found.offeredAt }),
    );
    open('/larkfen/requests/1187');
    await placeByForm('C99', '2026-06-18T16:45');
    expect(await screen.findByText('There is no chamber C99 here.')).toBeDefined();
  });
});

describe('asking for a slot', () => {
  test('names the very slot and its age, and says so on the page', async () => {
    const proposal = `POST ${api}/requests/1187/lots/21/proposal`;
    answers.set(offers, ok({ ...found, mayConfirm: false }));
    answers.set(proposal, ok({ ...request, version: 4 }));
    open('/larkfen/requests/1187');
    await userEvent.click(await screen.findByRole('button', { name: 'Ask for this' }));
    const dialog = screen.getByRole('dialog');
    await userEvent.click(within(dialog).getByRole('button', { name: 'Ask for this' }));
    await screen.findByText('The slot is asked for. A scheduler sees it and books.');
    expect(proposeOffer.body.parse(calls(proposal)[0]?.body)).toEqual({
      version: 3,
      offeredAt: found.offeredAt,
      placement: slot.placement,
    });
  });
});

describe('a rule that blocks an earlier slot', () => {
  test('leads to the instrument, and to asking that this very rule be lifted', async () => {
    const asked = `POST ${api}/requests/1187/deviations`;
    const blockedEarlier = { offer: { ...slot, chamberTag: 'C02' }, blockedBy: stop };
    answers.set(offers, ok({ ...found, blockedEarlier }));
    answers.set(asked, { status: 201, body: deviation });
    open('/larkfen/requests/1187');
    const way = await screen.findByRole('link', { name: 'Judge a new log of C02.' });
    expect(way.getAttribute('href')).toBe('/larkfen/equipment/C02');
    await userEvent.click(screen.getByRole('button', { name: 'Ask for a deviation.' }));
    const dialog = screen.getByRole('dialog');
    await userEvent.type(within(dialog).getByLabelText('Reason'), deviation.reason);
    await userEvent.click(within(dialog).getByRole('button', { name: 'Ask for a deviation' }));
    await waitFor(() => {
      expect(screen.queryByRole('dialog')).toBeNull();
    });
    expect(askDeviation.body.parse(calls(asked)[0]?.body)).toEqual({
      code: 'stability-logged',
      reason: deviation.reason,
    });
  });
});

describe('answering a deviation', () => {
  const decision = `POST ${api}/deviations/31/decision`;
  const manager = {
    ...site,
    roles: ['manager'] as const,
    actor: { personId: 12, grants: [{ role: 'manager', siteCode: 'larkfen' }], projectIds: [] },
  } as const;

  test('of reported work needs the word of the customer, refusing does not', async () => {
    answers.set(`GET ${api}/requests/1187/deviations`, ok({ items: [deviation] }));
    answers.set(decision, ok({ ...deviation, state: 'refused' }));
    open('/larkfen/requests/1187', manager);
    await userEvent.click(await screen.findByRole('button', { name: 'Answer' }));
    const dialog = screen.getByRole('dialog');
    await userEvent.type(within(dialog).getByLabelText('Answer'), 'Not without a log.');
    expect(
      within(dialog).getByRole('button', { name: /^Grant it: how the customer agreed is missing/ }),
    ).toBeDefined();
    await userEvent.click(within(dialog).getByRole('button', { name: 'Refuse it' }));
    await waitFor(() => {
      expect(calls(decision)).toHaveLength(1);
    });
    expect(decideDeviation.body.parse(calls(decision)[0]?.body)).toEqual({
      grant: false,
      reason: 'Not without a log.',
      customerAcceptance: null,
      expiresAt: null,
    });
  });

  test('is not for who reads only', async () => {
    answers.set(`GET ${api}/requests/1187/deviations`, ok({ items: [deviation] }));
    open('/larkfen/requests/1187');
    await screen.findByText(deviation.reason);
    expect(screen.queryByRole('button', { name: 'Answer' })).toBeNull();
  });

  test('once given can be read with its reason and how the customer agreed', async () => {
    const granted: DeviationDto = {
      ...deviation,
      state: 'granted',
      decidedBy: 'C. Marwhin',
      decidedAt: '2026-06-16T10:00:00.000Z',
      decisionReason: 'Quiet before and after.',
      customerAcceptance: 'by mail on 15 June',
    };
    answers.set(`GET ${api}/requests/1187/deviations`, ok({ items: [granted] }));
    open('/larkfen/requests/1187', manager);
    await screen.findByText('Quiet before and after.');
    expect(screen.getByText('Customer: by mail on 15 June')).toBeDefined();
    expect(screen.queryByRole('button', { name: 'Answer' })).toBeNull();
  });
});
