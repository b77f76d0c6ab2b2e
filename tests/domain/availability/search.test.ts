import { describe, expect, it } from 'vitest';
import { buildIndex } from '#shared/domain/availability/build-index.ts';
import { placeBooking } from '#shared/domain/availability/place-booking.ts';
import type { Placement } from '#shared/domain/availability/place-booking.ts';
import { search } from '#shared/domain/availability/search.ts';
import type { Offer, SearchOptions, SlotRequest } from '#shared/domain/availability/types.ts';
import { summarise } from '#shared/domain/checks/summarise.ts';
import type { Chamber, Facility, SourceChannel } from '#shared/domain/facility/types.ts';
import { applyOffer } from '#tests/support/apply-offer.ts';
import {
  buildChamber,
  buildFacility,
  buildMeter,
  buildRange,
  buildSlotRequest,
  buildSource,
  buildStability,
  buildValidity,
  buildWiredFacility,
  buildWiredPanel,
  dayMs,
  hourMs,
  mondayMs,
} from '#tests/support/build-facility.ts';

const nowMs = mondayMs + 7 * hourMs;
const options: SearchOptions = { options: 3, nowMs, horizonMs: nowMs + 28 * dayMs };
const iso = (ms: number | undefined): string => new Date(ms ?? Number.NaN).toISOString();

/** C01 with one panel of four paths. */
function lab(chamber: Partial<Chamber> = {}, source: Partial<SourceChannel> = {}): Facility {
  const made = buildChamber(chamber);
  return buildWiredFacility(
    [made],
    [buildWiredPanel({ id: 1, chamber: made, size: 4 }, { source })],
  );
}
function find(
  facility: Facility,
  request: Partial<SlotRequest> = {},
  change: Partial<SearchOptions> = {},
): ReturnType<typeof search> {
  return search(buildIndex(facility), buildSlotRequest(request), { ...options, ...change });
}
function firstOffer(facility: Facility, request: Partial<SlotRequest> = {}): Offer {
  const [offer] = find(facility, request).offers;
  if (offer === undefined) {
    throw new Error('The search found no offer.');
  }
  return offer;
}

describe('the earliest slots', () => {
  it('an empty laboratory is loaded as work begins, once a day and chamber', () => {
    const { offers, blockedEarlier, reasons } = find(lab());
    expect(offers.map(({ startMs }) => iso(startMs))).toEqual([
      '2026-06-01T07:00:00.000Z',
      '2026-06-02T07:00:00.000Z',
      '2026-06-03T07:00:00.000Z',
    ]);
    expect(blockedEarlier).toBeNull();
    expect(reasons).toEqual([]);
  });

  it('phases follow each other from connect to unload, with idle and set temperatures', () => {
    const offer = firstOffer(lab({ assessments: [buildStability({ setTemperatureC: 45 })] }), {
      setTemperatureC: 45,
    });
    expect(offer.phases.map(({ phase, setTemperatureC }) => `${phase} ${setTemperatureC}`)).toEqual(
      [
        'connect 25',
        'ramp 45',
        'soak 45',
        'match 45',
        'hold 45',
        'measure 45',
        'return 45',
        'wait 25',
        'unload 25',
      ],
    );
  });

  it('a slot that ends at night waits for the morning', () => {
    const offer = firstOffer(lab(), { earliestStartMs: mondayMs + 15 * hourMs });
    expect(iso(offer.startMs)).toBe('2026-06-01T14:00:00.000Z');
    expect(iso(offer.phases.at(-1)?.startMs)).toBe('2026-06-02T07:00:00.000Z');
    expect(offer.waitS).toBeGreaterThan(8 * 3600);
  });

  it('over the weekend of the clock change the unload is at 08:00 by the new clock', () => {
    // Dublin goes back on Sunday 25 October 2026: Monday 08:00 is 08:00 UTC, Friday 08:00 was 07:00.
    const fridayMs = Date.parse('2026-10-23T13:00:00Z');
    const { offers } = find(
      lab({ assessments: [buildStability({ assessedAtMs: fridayMs - 5 * dayMs })] }),
      { earliestStartMs: fridayMs },
      { nowMs: fridayMs, horizonMs: fridayMs + 20 * dayMs },
    );
    expect(iso(offers[0]?.startMs)).toBe('2026-10-23T13:00:00.000Z');
    expect(iso(offers[0]?.phases.at(-1)?.startMs)).toBe('2026-10-26T08:00:00.000Z');
  });

  it('without an unattended permission a slot must fit into the working day', () => {
    const offer = firstOffer(lab({ unattended: [] }), { earliestStartMs: mondayMs + 15 * hourMs });
    expect(iso(offer.startMs)).toBe('2026-06-02T07:00:00.000Z');
    expect(iso(offer.endMs) < '2026-06-02T17:00:00.000Z').toBe(true);
  });

  it('a set temperature within the tolerance that was logged is preferred to the asked one', () => {
    const facility = lab({ assessments: [buildStability({ setTemperatureC: 24.2 })] });
    expect(firstOffer(facility, { setToleranceK: 1 }).setTemperatureC).toBe(24.2);
    expect(find(facility, { setToleranceK: 0.1 }).offers).toEqual([]);
  });

  it('later slots are asked for with a later start', () => {
    const { offers } = find(lab(), { earliestStartMs: mondayMs + 3 * dayMs });
    expect(iso(offers[0]?.startMs)).toBe('2026-06-04T07:00:00.000Z');
  });

  it('a slot ends by the horizon', () => {
    expect(find(lab(), {}, { horizonMs: nowMs + 3 * hourMs }).offers).toEqual([]);
    expect(find(lab(), {}, { horizonMs: nowMs + 3 * hourMs }).reasons[0]?.code).toBe('no-time');
  });
});

describe('paths', () => {
  it('a lot takes paths of several panels and the hold of the slowest', () => {
    const chamber = buildChamber();
    const facility = buildWiredFacility(
      [chamber],
      [
        buildWiredPanel({ id: 1, chamber, size: 2, leadResistanceOhm: 0.2 }),
        buildWiredPanel({ id: 2, chamber, size: 2, leadResistanceOhm: 0.05 }),
      ],
    );
    const small = firstOffer(facility, { cellCount: 2 });
    const large = firstOffer(facility, { cellCount: 3 });
    expect(small.paths.map(({ panel }) => panel.name)).toEqual(['P02', 'P02']);
    expect(new Set(large.paths.map(({ panel }) => panel.name)).size).toBe(2);
    expect(large.endMs - large.startMs).toBeGreaterThan(small.endMs - small.startMs);
  });

  it('channels of one instrument are taken together', () => {
    const range = buildRange();
    const facility = buildFacility({
      sourceChannels: [buildSource({ pairedUnitId: 2002 })],
      meterChannels: [
        buildMeter({ ranges: [range] }),
        buildMeter({ unitId: 2002, tag: 'S01/1', pairedUnitId: 1001, ranges: [range] }),
      ],
      panels: [{ ...buildFacility().panels[0], meterUnitIds: [2001, 2002] }].map((panel) => ({
        id: 1,
        name: 'P01',
        chamberId: 1,
        leadResistanceOhm: 0.05,
        guarded: true,
        sourceUnitIds: [1001],
        positionUnitIds: [3001],
        ...panel,
      })),
    });
    expect(firstOffer(facility).paths.map(({ meter }) => meter.unitId)).toEqual([2002]);
  });

  it('the tightest suitable range is taken', () => {
    const chamber = buildChamber();
    const ranges = [
      buildRange({ id: 1, label: '1 mA', fullScaleA: 1e-3 }),
      buildRange({ id: 2, label: '100 µA', fullScaleA: 1e-4 }),
      buildRange({ id: 3, label: '10 µA', fullScaleA: 1e-5 }),
    ];
    const panel = buildWiredPanel({ id: 1, chamber, size: 1 }, { meter: { ranges } });
    const offer = firstOffer(buildWiredFacility([chamber], [panel]));
    expect(offer.paths[0]?.range.label).toBe('100 µA');
  });

  it('a path whose burden nobody recorded is never offered', () => {
    const chamber = buildChamber();
    const ranges = [buildRange({ burdenOhm: null })];
    const panel = buildWiredPanel({ id: 1, chamber, size: 1 }, { meter: { ranges } });
    const { offers, reasons } = find(buildWiredFacility([chamber], [panel]));
    expect(offers).toEqual([]);
    expect(reasons[0]?.code).toBe('burden-known');
  });
});

describe('loads', () => {
  const request = buildSlotRequest({ cellCount: 2 });
  const booked = (strictDoor: boolean, state: 'open' | 'closed' = 'open'): Facility => {
    const facility = lab({ strictDoor });
    return applyOffer(facility, request, { id: 1, offer: firstOffer(facility, request), state });
  };

  it('an open load is joined and its end does not move', () => {
    const facility = booked(true);
    const offer = firstOffer(facility);
    const load = facility.chambers[0]?.loads[0];
    expect(offer.joinsLoadId).toBe(10_001);
    expect(offer.endMs).toBe(load?.phases.at(-1)?.endMs);
    expect(offer.paths.map(({ position }) => position.tag)).toEqual(['C01/1-3']);
  });

  it('a load without time to spare for one more cell is not joined', () => {
    const facility = booked(true);
    const offer = firstOffer(facility, {
      cellCount: 2,
      tolerance: { kind: 'relative', fraction: 0.05 },
    });
    expect(offer.joinsLoadId).toBeNull();
  });

  it('under the strict rule the next load is connected while the door is open, under the tolerant one beside it', () => {
    const longer = { tolerance: { kind: 'relative', fraction: 0.05 } } as const;
    const strict = firstOffer(booked(true, 'closed'), longer);
    const end = booked(true).chambers[0]?.loads[0]?.phases.at(-1);
    expect(strict.joinsLoadId).toBeNull();
    // Its own soak begins when that door is shut for good.
    expect(iso(strict.phases[0]?.endMs)).toBe(iso(end?.endMs));
    const tolerant = firstOffer(booked(false, 'closed'));
    expect(iso(tolerant.startMs)).toBe('2026-06-01T07:00:00.000Z');
  });

  it('under the strict rule too a load may stand beside another whose doors it shares at both ends', () => {
    const facility = booked(true, 'closed');
    const beside = firstOffer(facility);
    const load = facility.chambers[0]?.loads[0];
    expect(beside.joinsLoadId).toBeNull();
    // The door is open for the first load until then; from there on nothing opens before both end.
    expect(iso(beside.phases[0]?.endMs)).toBe(iso(load?.phases[0]?.endMs));
    expect(iso(beside.phases.at(-1)?.startMs)).toBe(iso(load?.phases.at(-1)?.startMs));
  });

  it('a closed load that could be joined is the blocked earlier slot', () => {
    const { blockedEarlier } = find(booked(true, 'closed'));
    expect(blockedEarlier?.blockedBy.sentence).toBe('Load 10001 is closed.');
    expect(blockedEarlier?.joinsLoadId).toBe(10_001);
  });
});

describe('rules that block', () => {
  it('an earlier slot in a chamber whose log is too old is named with its one rule', () => {
    const old = buildChamber({
      id: 1,
      tag: 'C01',
      assessments: [buildStability({ assessedAtMs: nowMs - 97 * dayMs })],
    });
    const busy = buildChamber({ id: 2, tag: 'C02' });
    const panels = [
      buildWiredPanel({ id: 1, chamber: old, size: 1 }),
      buildWiredPanel({ id: 2, chamber: busy, size: 1 }),
    ];
    const facility = buildWiredFacility([old, busy], panels);
    const taken = panels[1]?.meterChannels.map(({ unitId }) => ({
      unitId,
      startMs: nowMs,
      endMs: nowMs + dayMs,
      by: 'outage' as const,
      recordId: 4,
      label: 'outage 4',
    }));
    const { offers, blockedEarlier } = find({ ...facility, allocations: taken ?? [] });
    expect(offers[0]?.chamberTag).toBe('C02');
    expect(blockedEarlier?.chamberTag).toBe('C01');
    expect(blockedEarlier?.blockedBy.code).toBe('stability-logged');
    expect(blockedEarlier?.blockedBy.waysOut.map(({ kind }) => kind)).toContain('deviation');
  });

  it('a deviation in force makes it an offer with a caution', () => {
    const facility = lab({ assessments: [buildStability({ assessedAtMs: nowMs - 97 * dayMs })] });
    const deviation = { id: 12, code: 'stability-logged', expiresAtMs: nowMs + 3 * dayMs } as const;
    const { offers } = find(facility, { deviations: [deviation] });
    const lifted = offers[0]?.checks.find(({ code }) => code === 'stability-logged');
    expect(lifted).toMatchObject({ outcome: 'caution', liftedByDeviationId: 12 });
    expect(offers.every(({ endMs }) => endMs <= deviation.expiresAtMs)).toBe(true);
  });

  it('indicative work is offered with cautions where reported work is refused', () => {
    const facility = lab({}, { stabilityVPerH: 1e-6 });
    expect(find(facility).offers).toEqual([]);
    expect(find(facility).reasons[0]?.code).toBe('source-stability');
    expect(find(facility).blockedEarlier).toBeNull();
    expect(
      firstOffer(facility, { grade: 'indicative' })
        .checks.filter(({ outcome }) => outcome === 'caution')
        .map(({ code }) => code),
    ).toContain('source-stability');
  });

  it('nothing is offered past the end of a calibration', () => {
    const validity = [buildValidity({ endMs: nowMs + 30 * hourMs })];
    const { offers, reasons } = find(lab({}, { validity }));
    expect(offers.length).toBeGreaterThan(0);
    expect(offers.every(({ endMs }) => endMs <= nowMs + 30 * hourMs)).toBe(true);
    expect(reasons).toEqual([]);
  });

  it('a settled value waits until the cells have rested for a day', () => {
    const offer = firstOffer(lab(), { restedSinceMs: nowMs + 2 * hourMs });
    expect(iso(offer.startMs)).toBe('2026-06-02T08:00:00.000Z');
  });

  it('too few wired paths, an unknown state of charge and an empty site are said in words', () => {
    expect(find(lab(), { cellCount: 5 }).reasons).toEqual([
      { code: 'no-path', sentence: '5 cells need 5 paths; C01 has 4 wired.', chambers: ['C01'] },
    ]);
    const cell = { ...buildSlotRequest().cell, chemistry: 'lfp', stateOfChargePct: null } as const;
    expect(find(lab(), { cell }).reasons[0]?.code).toBe('not-estimable');
    expect(find(buildFacility({ chambers: [], panels: [] })).reasons[0]?.sentence).toMatch(
      /no chamber/,
    );
  });

  it('the reasons name the chambers, the most frequent first', () => {
    const { reasons } = find(lab({ protectionLevel: 3 }));
    expect(reasons[0]).toMatchObject({ code: 'hazard-protection', chambers: ['C01'] });
  });
});

describe('placing a booking', () => {
  const request = buildSlotRequest({ cellCount: 2 });
  const placementOf = (offer: Offer, change: Partial<Placement> = {}): Placement => ({
    chamberId: offer.chamberId,
    startMs: offer.startMs,
    joinsLoadId: offer.joinsLoadId,
    setTemperatureC: offer.setTemperatureC,
    paths: offer.paths.map(({ panel, source, meter, range, position }) => ({
      panelId: panel.id,
      sourceUnitId: source.unitId,
      meterUnitId: meter.unitId,
      rangeId: range.id,
      positionUnitId: position.unitId,
    })),
    holdS: null,
    bookedPhases: null,
    nowMs,
    ignoreBookingId: null,
    ...change,
  });
  const facility = lab();
  const offer = firstOffer(facility, request);
  const index = buildIndex(facility);

  it('an offer that is confirmed has the same phases, checks and nothing that stops', () => {
    const placed = placeBooking(index, request, placementOf(offer));
    expect(placed).toMatchObject({ outcome: 'placed', checks: offer.checks });
    expect(placed.outcome === 'placed' ? placed.facts.phases : []).toEqual(offer.phases);
  });

  it('what is booked does not clash with itself, but with a second one', () => {
    const after = buildIndex(applyOffer(facility, request, { id: 7, offer }));
    const recheck = placementOf(offer, { joinsLoadId: 10_007, ignoreBookingId: 7 });
    const own = placeBooking(after, request, recheck);
    expect(own.outcome === 'placed' ? summarise(own.checks).outcome : own).toBe('pass');
    const second = placeBooking(after, request, placementOf(offer));
    const stops = second.outcome === 'placed' ? summarise(second.checks).stops : [];
    expect(stops.map(({ code }) => code)).toContain('double-use');
  });

  it('a move to a night is placed, and the check says that nobody is there', () => {
    const night = placementOf(offer, { startMs: mondayMs + 22 * hourMs });
    const placed = placeBooking(index, request, night);
    const stops = placed.outcome === 'placed' ? summarise(placed.checks).stops : [];
    expect(stops.map(({ code }) => code)).toEqual(['working-hours']);
  });

  it('a resized hold changes the phases and the need', () => {
    const placed = placeBooking(index, request, placementOf(offer, { holdS: 6 * 3600 }));
    const hold =
      placed.outcome === 'placed'
        ? placed.facts.phases.find(({ phase }) => phase === 'hold')
        : undefined;
    expect(hold === undefined ? null : hold.endMs - hold.startMs).toBe(6 * hourMs);
    expect(placed).toMatchObject({ needsS: { hold: 21_600 } });
  });

  it('phases as booked are re-checked as they are', () => {
    const short = offer.phases.filter(({ phase }) => phase !== 'hold');
    const placed = placeBooking(index, request, placementOf(offer, { bookedPhases: short }));
    const stops = placed.outcome === 'placed' ? summarise(placed.checks).stops : [];
    expect(stops.map(({ code }) => code)).toEqual(['slot-length']);
  });

  it('what does not exist, and a load that would have to grow, are refused in words', () => {
    expect(placeBooking(index, request, placementOf(offer, { chamberId: 9 }))).toMatchObject({
      outcome: 'refused',
      reason: 'unknown',
    });
    expect(placeBooking(index, request, placementOf(offer, { joinsLoadId: 9 }))).toMatchObject({
      reason: 'unknown',
    });
    const after = buildIndex(applyOffer(facility, request, { id: 7, offer }));
    const longer = placementOf(offer, { joinsLoadId: 10_007, holdS: 50 * 3600 });
    expect(placeBooking(after, request, longer)).toMatchObject({ reason: 'load-too-short' });
  });
});
