// @vitest-environment happy-dom
import { cleanup, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, test } from 'vitest';
import { z } from 'zod';
import { requestFields } from '#shared/contracts/requests.contract.ts';
import {
  answers,
  api,
  calls,
  found,
  ok,
  open,
  refusal,
  request,
  stubServer,
} from './request-bench.tsx';

stubServer();

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
