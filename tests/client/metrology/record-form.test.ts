import { expect, test } from 'vitest';
import type { InstrumentDto } from '#shared/contracts/equipment.contract.ts';
import {
  dueAfter,
  fieldError,
  groupScopes,
  readRecord,
  scopeKey,
} from '#src/features/metrology/record-form.view.ts';
import type { RecordDraft } from '#src/features/metrology/record-form.view.ts';

const scopes: InstrumentDto['scopes'] = [1, 2].flatMap((channelId) =>
  ['2 µA', '20 µA'].map((rangeLabel, place) => ({
    channelLabel: `M07/${channelId}`,
    channelId,
    function: 'measure' as const,
    rangeLabel,
    meterRangeId: place + 1,
    badge: 'due-soon' as const,
    dueOn: null,
    calibrationId: null,
    limitation: null,
  })),
);
const instrument: InstrumentDto = {
  tag: 'M07',
  kind: 'meter',
  model: 'microammeter',
  serial: '1',
  roomName: null,
  state: 'in-service',
  badge: 'due-soon',
  dueOn: null,
  channelCount: 2,
  custodian: null,
  firmware: null,
  parentTag: null,
  childTags: [],
  note: '',
  facts: [],
  scopes,
  calibrations: [],
  assessments: [],
  unavailability: [],
  nextBookings: [],
  version: 1,
};
const draft: RecordDraft = {
  performedOn: '2026-03-02',
  dueOn: '',
  provider: 'in-house',
  certificateNumber: 'LF-1',
  conformityAsFound: 'conforms',
  conformityAsLeft: 'conforms',
  note: '',
  ticked: new Set(scopes.map(scopeKey)),
  limitations: new Map([['measure 2 µA', ' not below 0.2 µA ']]),
  fileId: null,
};

test('scopes are ticked by range, and a limitation goes to every channel of its range', () => {
  expect(groupScopes(scopes).map(({ rangeLabel }) => rangeLabel)).toEqual(['2 µA', '20 µA']);
  const { body, errors } = readRecord(draft, { instrument, dueOn: '2027-03-02', replacesId: 7 });
  expect(errors.size).toBe(0);
  expect(body?.scopes.map(({ limitation }) => limitation)).toEqual([
    'not below 0.2 µA',
    'not below 0.2 µA',
    null,
    null,
  ]);
  expect(body?.replacesId).toBe(7);
});

test('what is missing is told at its field, and nothing is sent', () => {
  const { body, errors } = readRecord(
    { ...draft, ticked: new Set(), provider: '', certificateNumber: '' },
    { instrument, dueOn: '', replacesId: null },
  );
  expect(body).toBeNull();
  expect([...errors.keys()].sort()).toEqual(['certificateNumber', 'dueOn', 'provider', 'scopes']);
});

test('the next due day is the same day of the month, or the last of a shorter one', () => {
  expect(dueAfter('2026-03-02', 12)).toBe('2027-03-02');
  expect(dueAfter('2024-02-29', 12)).toBe('2025-02-28');
  expect(dueAfter('', 12)).toBe('');
});

test('a fault inside a list belongs to the list', () => {
  const server = new Map([['#/scopes/3', 'M07 has no such range.']]);
  expect(fieldError('scopes', new Map(), server)).toBe('M07 has no such range.');
  expect(fieldError('dueOn', new Map(), server)).toBeUndefined();
});
