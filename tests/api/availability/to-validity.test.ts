import { expect, test } from 'vitest';
import type {
  CalibrationRow,
  CalibrationScopeRow,
  LimitationRow,
} from '#server/features/availability/calibration-records.repository.ts';
import { groupBy } from '#server/features/availability/group-by.ts';
import { buildValidity, limitSpans, toBreaks } from '#server/features/availability/to-validity.ts';
import { buildCalendarIndex } from '#shared/domain/calendar/build-calendar-index.ts';
import type { ValidityKey } from '#shared/domain/calibration-validity/types.ts';

const site = buildCalendarIndex({ zone: 'Europe/Dublin', weekly: {}, exceptions: [] });
const things = {
  sourceChannelIds: [],
  meterChannelIds: [1, 2],
  rangeIdsByChannel: new Map([
    [1, [11, 12]],
    [2, [11, 12]],
  ]),
};

function record(change: Partial<CalibrationRow> = {}): CalibrationRow {
  return {
    id: 1,
    instrumentId: 7,
    performedOn: '2026-01-10',
    dueOn: '2026-07-09',
    decidedAt: new Date('2026-01-12T00:00:00Z'),
    replacesId: null,
    conformityAsLeft: 'conforms',
    ...change,
  };
}

function scope(change: Partial<CalibrationScopeRow> = {}): CalibrationScopeRow {
  return {
    calibrationId: 1,
    channelId: null,
    function: 'measure',
    meterRangeId: null,
    limitation: null,
    ...change,
  };
}

function validityOf(
  calibrations: readonly CalibrationRow[],
  scopes: readonly CalibrationScopeRow[],
): (channelId: number, rangeId: number) => string[] {
  const byRecord = groupBy(scopes, (row) => row.calibrationId);
  const validity = buildValidity({
    instrumentId: 7,
    things,
    calibrations,
    scopes: byRecord,
    breaks: [],
    site,
  });
  return (channelId, rangeId) => {
    const key: ValidityKey = { channelId, function: 'measure', rangeId };
    return validity(key).map(
      (span) =>
        `${new Date(span.startMs).toISOString().slice(0, 10)} ${span.calibrationId} ${span.limitation ?? 'whole'}`,
    );
  };
}

test('a scope without channel and range stands for all of the instrument’s', () => {
  const of = validityOf([record()], [scope()]);
  expect(of(1, 11)).toEqual(['2026-01-10 1 whole']);
  expect(of(2, 12)).toEqual(['2026-01-10 1 whole']);
});

test('what names its channel and range wins over what stands for all of them', () => {
  const of = validityOf(
    [record()],
    [scope({ channelId: 1, meterRangeId: 12, limitation: 'up to 1 µA' }), scope()],
  );
  expect(of(1, 11)).toEqual(['2026-01-10 1 whole']);
  expect(of(1, 12)).toEqual(['2026-01-10 1 up to 1 µA']);
});

test('a later record of one range takes that range over and leaves the others', () => {
  const of = validityOf(
    [record(), record({ id: 2, performedOn: '2026-03-01', dueOn: '2026-08-31' })],
    [scope(), scope({ calibrationId: 2, channelId: 2, meterRangeId: 11 })],
  );
  expect(of(2, 11)).toEqual(['2026-01-10 1 whole', '2026-03-01 2 whole']);
  expect(of(2, 12)).toEqual(['2026-01-10 1 whole']);
});

test('a corrected record does not count, whatever scope its correction has', () => {
  const of = validityOf(
    [record(), record({ id: 2, replacesId: 1 })],
    [scope(), scope({ calibrationId: 2, channelId: 1 })],
  );
  expect(of(1, 11)).toEqual(['2026-01-10 2 whole']);
  expect(of(2, 11)).toEqual([]);
});

test('a failed calibration and a withdrawal break validity, a breakdown does not', () => {
  const row = {
    id: 1,
    instrumentId: 7,
    unitId: null,
    note: 'x',
    startsAt: new Date(5),
    endsAt: null,
  };
  const breaks = toBreaks(
    [
      { ...row, reason: 'breakdown' },
      { ...row, reason: 'failed-calibration' },
      { ...row, reason: 'withdrawn', instrumentId: null, unitId: 3 },
    ],
    (unitId) => unitId * 100,
  );
  expect(breaks).toEqual([
    { channelId: null, startMs: 5, endMs: null },
    { channelId: 300, startMs: 5, endMs: null },
  ]);
});

test('a limitation marks only its own time, and the due day stays with the last stretch', () => {
  const limitation: LimitationRow = {
    unitId: 1,
    note: 'warm up for two hours',
    maxCurrentA: null,
    startsAt: new Date(10),
    endsAt: new Date(20),
  };
  const span = { startMs: 0, endMs: 30, calibrationId: 1, dueOn: '2026-07-09', limitation: null };
  expect(limitSpans([span], [limitation])).toEqual([
    { ...span, endMs: 10, dueOn: null },
    { ...span, startMs: 10, endMs: 20, dueOn: null, limitation: 'warm up for two hours' },
    { ...span, startMs: 20 },
  ]);
  expect(limitSpans([span], [])).toEqual([span]);
});
