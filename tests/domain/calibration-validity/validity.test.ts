import { describe, expect, it } from 'vitest';
import { buildCalendarIndex } from '#shared/domain/calendar/build-calendar-index.ts';
import { calibrationBadge } from '#shared/domain/calibration-validity/calibration-badge.ts';
import type {
  ApprovedCalibration,
  CalibrationScope,
  ValidityBreak,
} from '#shared/domain/calibration-validity/types.ts';
import { validUntil } from '#shared/domain/calibration-validity/valid-until.ts';
import { validitySpans } from '#shared/domain/calibration-validity/validity-spans.ts';
import type { ServiceState } from '#shared/domain/facility/types.ts';

const dublin = buildCalendarIndex({ zone: 'Europe/Dublin', weekly: {}, exceptions: [] });
const key = { channelId: 7, function: 'measure', rangeId: 3 } as const;
const scope: CalibrationScope = { ...key, conformityAsLeft: 'conforms', limitation: null };
const at = (iso: string): number => Date.parse(iso);

function calibration(change: Partial<ApprovedCalibration> = {}): ApprovedCalibration {
  return {
    id: 1,
    performedOn: '2026-01-10',
    dueOn: '2026-07-09',
    approvedAtMs: at('2026-01-12T10:00:00Z'),
    replacesId: null,
    extendedDueOn: null,
    scopes: [scope],
    ...change,
  };
}
function spansOf(
  calibrations: readonly ApprovedCalibration[],
  breaks: readonly ValidityBreak[] = [],
): readonly string[] {
  return validitySpans({ site: dublin, key, calibrations, breaks }).map(
    (span) =>
      `${new Date(span.startMs).toISOString()} ${new Date(span.endMs).toISOString()} ${span.calibrationId} ${span.dueOn ?? 'cut'}`,
  );
}

describe('validity of a channel × function × range', () => {
  it('runs from the day it was performed to the start of the day after it is due, at the site', () => {
    expect(spansOf([calibration()])).toEqual([
      '2026-01-10T00:00:00.000Z 2026-07-09T23:00:00.000Z 1 2026-07-09',
    ]);
  });

  it('an approved extension moves the due day', () => {
    expect(spansOf([calibration({ extendedDueOn: '2026-08-01' })])).toEqual([
      '2026-01-10T00:00:00.000Z 2026-08-01T23:00:00.000Z 1 2026-08-01',
    ]);
  });

  it('the next calibration takes over on its own day', () => {
    const next = calibration({ id: 2, performedOn: '2026-06-01', dueOn: '2026-12-01' });
    expect(spansOf([next, calibration()])).toEqual([
      '2026-01-10T00:00:00.000Z 2026-05-31T23:00:00.000Z 1 cut',
      '2026-05-31T23:00:00.000Z 2026-12-02T00:00:00.000Z 2 2026-12-01',
    ]);
  });

  it('a later calibration that was left not conforming ends validity though the earlier is not due', () => {
    const bad = calibration({
      id: 2,
      performedOn: '2026-06-01',
      scopes: [{ ...scope, conformityAsLeft: 'does-not-conform' }],
    });
    expect(spansOf([calibration(), bad])).toEqual([
      '2026-01-10T00:00:00.000Z 2026-05-31T23:00:00.000Z 1 cut',
    ]);
  });

  it('a corrected calibration does not count, its correction does', () => {
    const correction = calibration({ id: 2, replacesId: 1, dueOn: '2026-05-01' });
    expect(spansOf([calibration(), correction])).toEqual([
      '2026-01-10T00:00:00.000Z 2026-05-01T23:00:00.000Z 2 2026-05-01',
    ]);
  });

  it('another range, function or channel of the same record is not vouched for', () => {
    for (const other of [{ rangeId: 4 }, { rangeId: null }, { channelId: 8 }]) {
      expect(spansOf([calibration({ scopes: [{ ...scope, ...other }] })])).toEqual([]);
    }
    expect(spansOf([calibration({ scopes: [{ ...scope, function: 'source' }] })])).toEqual([]);
  });

  it('unavailable time is cut out, open-ended time to the end', () => {
    const startMs = at('2026-03-01T00:00:00Z');
    const gap = { channelId: 7, startMs, endMs: at('2026-03-02T00:00:00Z') };
    expect(spansOf([calibration()], [gap])).toEqual([
      '2026-01-10T00:00:00.000Z 2026-03-01T00:00:00.000Z 1 cut',
      '2026-03-02T00:00:00.000Z 2026-07-09T23:00:00.000Z 1 2026-07-09',
    ]);
    expect(spansOf([calibration()], [{ channelId: null, startMs, endMs: null }])).toEqual([
      '2026-01-10T00:00:00.000Z 2026-03-01T00:00:00.000Z 1 cut',
    ]);
    expect(spansOf([calibration()], [{ ...gap, channelId: 8 }])).toHaveLength(1);
  });

  it('without a statement of conformity the stretch is limited', () => {
    const [span] = validitySpans({
      site: dublin,
      key,
      calibrations: [calibration({ scopes: [{ ...scope, conformityAsLeft: 'not-stated' }] })],
      breaks: [],
    });
    expect(span?.limitation).toBe('no statement of conformity was made');
  });

  it('validity goes on through stretches that touch and stops at a gap', () => {
    const spans = [
      { startMs: 0, endMs: 5 },
      { startMs: 5, endMs: 9 },
      { startMs: 10, endMs: 20 },
    ];
    expect(validUntil(spans, 2)).toBe(9);
    expect(validUntil(spans, 9)).toBeNull();
    expect(validUntil(spans, 10)).toBe(20);
    expect(validUntil([], 0)).toBeNull();
  });
});

describe('the badge', () => {
  const badge = (
    now: string,
    records: readonly ApprovedCalibration[] = [calibration()],
    state: ServiceState = 'in-service',
  ): string =>
    calibrationBadge({
      state,
      spans: validitySpans({ site: dublin, key, calibrations: records, breaks: [] }),
      nowMs: at(now),
      site: dublin,
      dueSoonDays: 30,
    }).word;

  it('is in date until 30 days before the due day, then due soon to its last minute', () => {
    expect(badge('2026-06-08T12:00:00Z')).toBe('in-date');
    expect(badge('2026-06-09T12:00:00Z')).toBe('due-soon');
    expect(badge('2026-07-09T22:59:59Z')).toBe('due-soon');
    expect(badge('2026-07-09T23:00:00Z')).toBe('overdue');
  });

  it('says not calibrated where no record vouches for it', () => {
    expect(badge('2026-06-08T12:00:00Z', [])).toBe('not-calibrated');
    expect(badge('2026-01-01T12:00:00Z')).toBe('not-calibrated');
  });

  it('says limited while a limitation is in force', () => {
    const limited = calibration({ scopes: [{ ...scope, limitation: 'only below 10 µA' }] });
    expect(badge('2026-03-01T12:00:00Z', [limited])).toBe('limited');
  });

  it('the state of service comes first', () => {
    expect(badge('2026-03-01T12:00:00Z', undefined, 'awaiting-release')).toBe('awaiting-release');
    expect(badge('2026-03-01T12:00:00Z', undefined, 'out-of-service')).toBe('out-of-service');
    expect(badge('2026-03-01T12:00:00Z', undefined, 'retired')).toBe('out-of-service');
  });

  it('names the due day and the end of validity', () => {
    const facts = calibrationBadge({
      state: 'in-service',
      spans: validitySpans({ site: dublin, key, calibrations: [calibration()], breaks: [] }),
      nowMs: at('2026-03-01T12:00:00Z'),
      site: dublin,
      dueSoonDays: 30,
    });
    expect(facts.dueOn).toBe('2026-07-09');
    expect(facts.validUntilMs).toBe(at('2026-07-09T23:00:00Z'));
  });
});
