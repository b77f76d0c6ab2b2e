import { expect, test } from 'vitest';
import type { ScopeState } from '#shared/contracts/equipment.contract.ts';
import { groupScopes } from '#src/features/equipment/scope-groups.view.ts';

function scope(channel: number | null, change: Partial<ScopeState> = {}): ScopeState {
  return {
    channelLabel: channel === null ? null : `M07/${channel}`,
    channelId: channel,
    function: 'measure',
    rangeLabel: '20 µA',
    meterRangeId: 3,
    badge: 'in-date',
    dueOn: '2027-01-10',
    calibrationId: 5,
    limitation: null,
    ...change,
  };
}

test('channels in the same state are one row, and one that differs stands alone', () => {
  const groups = groupScopes([
    scope(1),
    scope(2),
    scope(3, { badge: 'limited', limitation: 'not below 0.2 µA' }),
    scope(4),
  ]);
  expect(groups.map(({ channels }) => channels)).toEqual(['M07/1, 2, 4', 'M07/3']);
});

test('a run of channels is said by its ends, whatever their order', () => {
  expect(groupScopes([scope(10), scope(9), scope(8)])[0]?.channels).toBe('M07/8–10');
});

test('an instrument without channels is calibrated as a whole', () => {
  expect(groupScopes([scope(null)])[0]?.channels).toBeNull();
});
