import { describe, expect, test } from 'vitest';
import type { CheckResultDto } from '#shared/contracts/check.schemas.ts';
import type { OfferDto, OffersDto } from '#shared/contracts/offers.contract.ts';
import { checkCodes } from '#shared/domain/checks/types.ts';
import { countStops, slipLines } from '#src/features/request/check-lines.view.ts';
import { describePaths, joinTags } from '#src/features/request/offer-path.view.ts';
import {
  isExpired,
  lifetimeMs,
  liftableCodes,
  offerRows,
  slotAct,
  waysOf,
} from '#src/features/request/offers.view.ts';
import { refusalText } from '#src/features/request/refusal.view.ts';
import { readProblem } from '#src/lib/problem.ts';

function check(change: Partial<CheckResultDto> = {}): CheckResultDto {
  return {
    code: 'stability-logged',
    outcome: 'pass',
    sentence: 'The log of C02 is 12 days old.',
    evidence: [],
    waysOut: [],
    used: null,
    liftedByDeviationId: null,
    ...change,
  };
}

function offer(chamberTag: string, startAt: string): OfferDto {
  return {
    placement: { chamberTag, startAt, setTemperatureC: 45, joinsLoadId: null, paths: [] },
    startAt,
    endAt: '2026-06-19T07:30:00.000Z',
    chamberTag,
    joinsLoadId: null,
    setTemperatureC: 45,
    paths: [],
    phases: [],
    waitS: 0,
    estimate: { outcome: 'unknown', modelVersion: '1', figures: [], notes: [], reason: 'none' },
    checks: [],
    remark: '',
  };
}

const starts = [16, 17, 18, 19, 20].map((day) => `2026-06-${day}T15:45:00.000Z`);
const stop = check({ outcome: 'stop', sentence: 'The last log of C02 is 97 days old.' });

function found(change: Partial<OffersDto> = {}): OffersDto {
  return {
    lotId: 21,
    offeredAt: '2026-06-16T09:40:00.000Z',
    expiresAt: '2026-06-16T09:50:00.000Z',
    startsLookedAt: 2140,
    offers: starts.map((start) => offer('C07', start)),
    blockedEarlier: null,
    reasons: [],
    mayConfirm: false,
    ...change,
  };
}

const noWish = { proposal: null };

describe('the rows of slots', () => {
  test('put the earlier slot that a rule blocks first, and number only what is valid', () => {
    const blockedEarlier = {
      offer: offer('C02', '2026-06-16T06:00:00.000Z'),
      blockedBy: stop,
    };
    const rows = offerRows(found({ blockedEarlier }), 3, noWish);
    expect(rows.map((row) => [row.offer.chamberTag, row.place])).toEqual([
      ['C02', null],
      ['C07', 1],
      ['C07', 2],
      ['C07', 3],
    ]);
    expect(rows[0]?.blockedBy?.sentence).toBe(stop.sentence);
  });

  test('show later ones only when asked, and have a name each', () => {
    expect(offerRows(found(), 3, noWish)).toHaveLength(3);
    const all = offerRows(found(), 5, noWish);
    expect(new Set(all.map((row) => row.key)).size).toBe(5);
  });

  test('mark the slot that was asked for, of this lot and at this very time', () => {
    const proposal = {
      lotId: 21,
      chamberTag: 'C07',
      startAt: '2026-06-17T16:45:00.000+01:00',
      endAt: '2026-06-19T07:30:00.000Z',
      proposedAt: '2026-06-16T09:41:00.000Z',
    };
    const wished = (lotId: number) =>
      offerRows(found(), 3, { proposal: { ...proposal, lotId } }).map((row) => row.isWished);
    expect(wished(21)).toEqual([false, true, false]);
    expect(wished(22)).toEqual([false, false, false]);
  });
});

describe('the life of an offer', () => {
  const received = Date.parse('2031-01-01T00:00:00.000Z');

  test('is counted from its arrival, so that a wrong clock here does no harm', () => {
    expect(lifetimeMs(found())).toBe(600_000);
    expect(isExpired(found(), received, received + 599_999)).toBe(false);
    expect(isExpired(found(), received, received + 600_000)).toBe(true);
  });

  test('is never negative', () => {
    expect(lifetimeMs(found({ expiresAt: '2026-06-16T09:00:00.000Z' }))).toBe(0);
  });
});

describe('what can be done with a slot', () => {
  const scheduler = { mayConfirm: true, mayPropose: false };
  const owner = { mayConfirm: false, mayPropose: true };

  test('is booking for who may confirm, once the request is with the schedulers', () => {
    expect(slotAct('submitted', scheduler)).toBe('book');
    expect(slotAct('partly-booked', scheduler)).toBe('book');
    expect(slotAct('draft', scheduler)).toBeNull();
  });

  test('is asking for its owner, who also submits a draft that way', () => {
    expect(slotAct('draft', owner)).toBe('propose');
    expect(slotAct('submitted', owner)).toBe('propose');
    expect(slotAct('draft', { mayConfirm: true, mayPropose: true })).toBe('propose');
    expect(slotAct('submitted', { mayConfirm: true, mayPropose: true })).toBe('book');
  });

  test('is nothing for who only reads, and for a request that is over', () => {
    expect(slotAct('submitted', { mayConfirm: false, mayPropose: false })).toBeNull();
    for (const state of ['booked', 'done', 'withdrawn'] as const) {
      expect(slotAct(state, { mayConfirm: true, mayPropose: true }), state).toBeNull();
    }
  });
});

describe('the ways out of a stop', () => {
  test('lead to the instrument, to the form, or to asking for a deviation', () => {
    const ways = waysOf(
      check({
        outcome: 'stop',
        waysOut: [
          { kind: 'assess-log', sentence: 'Judge a new log.', subject: 'C02' },
          { kind: 'other-path', sentence: 'Take another position.', subject: 'C06/1' },
          { kind: 'change-request', sentence: 'State the rest.', subject: null },
          { kind: 'deviation', sentence: 'Ask for a deviation.', subject: 'stability-logged' },
          { kind: 'later-start', sentence: 'Start later.', subject: null },
          { kind: 'ask-safety', sentence: 'Ask the safety officer.', subject: 'NP35' },
        ],
      }),
    );
    expect(ways.map((way) => way.kind)).toEqual([
      'instrument',
      'instrument',
      'change',
      'deviation',
      'say',
      'say',
    ]);
    expect(ways.flatMap((way) => (way.kind === 'instrument' ? [way.tag] : []))).toEqual([
      'C02',
      'C06',
    ]);
  });

  test('never lead to lifting a rule that nobody may lift', () => {
    const waysOut = [{ kind: 'deviation', sentence: 'Ask for a deviation.', subject: null }];
    expect(waysOf(check({ code: 'double-use', waysOut }))[0]?.kind).toBe('say');
    expect(liftableCodes).not.toContain('cell-limits');
    expect(liftableCodes.length).toBeGreaterThan(0);
    expect(liftableCodes.every((code) => checkCodes.includes(code))).toBe(true);
  });
});

describe('the slip of checks', () => {
  const checks = [
    check({ code: 'mapping' }),
    check({ code: 'rest-time', outcome: 'caution', sentence: 'Rested 12 days.' }),
    check({ code: 'double-use', outcome: 'stop', sentence: 'S06/1 is taken.' }),
    check({ code: 'load-open' }),
  ];

  test('tells stops before cautions and the passes in one line', () => {
    expect(slipLines(checks).map((line) => [line.key, line.kind])).toEqual([
      ['double-use', 'stop'],
      ['rest-time', 'caution'],
      ['passes', 'pass'],
    ]);
    expect(slipLines(checks).at(-1)?.text).toBe('2 checks pass.');
  });

  test('does not count a stop that a deviation has lifted', () => {
    expect(countStops(checks)).toBe(1);
    expect(countStops([{ ...stop, liftedByDeviationId: 4 }])).toBe(0);
  });
});

describe('the path of a slot in a line', () => {
  test('says each instrument once, with a run of channels as a run', () => {
    expect(joinTags(['S06/3', 'S06/1', 'S06/2'])).toBe('S06/1–3');
    expect(joinTags(['S06/1', 'S06/2', 'S07/4'])).toBe('S06/1, 2; S07/4');
    expect(joinTags(['C07/1', 'C07/3', 'C07/5'])).toBe('C07/1, 3, 5');
  });

  test('keeps positions, sources and meters apart', () => {
    const path = {
      panelId: 1,
      panelName: 'P1',
      sourceUnitId: 1,
      meterUnitId: 2,
      meterRangeId: 3,
      meterRangeLabel: '200 µA',
      positionUnitId: 4,
    };
    const at = (channel: number) => ({
      ...path,
      sourceTag: `S06/${channel}`,
      meterTag: `M12/${channel}`,
      positionTag: `C07/${channel}`,
    });
    expect(describePaths([at(1), at(2), at(3)])).toEqual({
      positions: 'C07/1–3',
      sources: 'S06/1–3',
      meters: 'M12/1–3',
    });
  });
});

describe('a refusal', () => {
  const refusal = (code: string) =>
    refusalText(
      readProblem(409, {
        type: `/problems/${code}`,
        title: 'Refused',
        status: 409,
        detail: 'S06/1 is taken by booking 2418 until Thu 18 Jun 08:30.',
        instance: 'r-1',
        code,
      }),
    );

  test('keeps the sentence that says who has it, and adds what to do now', () => {
    const said = refusal('booking.clash') ?? '';
    expect(said.startsWith('S06/1 is taken by booking 2418 until Thu 18 Jun 08:30. ')).toBe(true);
    expect(said).toContain('choose another');
  });

  test('is left as it is where the server has said what to do', () => {
    expect(refusal('booking.horizon')).toBe(
      'S06/1 is taken by booking 2418 until Thu 18 Jun 08:30.',
    );
    expect(refusalText(null)).toBeUndefined();
  });
});
