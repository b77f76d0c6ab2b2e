import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildIndex } from '#shared/domain/availability/build-index.ts';
import { search } from '#shared/domain/availability/search.ts';
import type { SlotRequest } from '#shared/domain/availability/types.ts';
import type { Facility, TakenSpan } from '#shared/domain/facility/types.ts';
import { applyOffer } from '#tests/support/apply-offer.ts';
import { offerFaults } from '#tests/support/brute-lab.ts';
import { bruteSearch } from '#tests/support/brute-search.ts';
import {
  buildChamber,
  buildSlotRequest,
  buildStability,
  buildValidity,
  buildWiredFacility,
  buildWiredPanel,
  dayMs,
  hourMs,
  mondayMs,
  officeHours,
} from '#tests/support/build-facility.ts';
import { seededRandom } from '#tests/support/seeded-random.ts';

type Scene = {
  readonly facility: Facility;
  readonly request: SlotRequest;
  readonly nowMs: number;
  readonly horizonMs: number;
};

/** A small laboratory in the middle of its work, drawn from a seed. */
function drawScene(seed: number): Scene {
  const random = seededRandom(seed);
  const chance = (share: number): boolean => random() < share;
  const upTo = (most: number): number => 1 + Math.floor(random() * most);
  const isToronto = chance(0.3);
  // Week of the clock change in Dublin (29 March) or Toronto (8 March), or an ordinary one.
  const weeks = [mondayMs, Date.parse('2026-03-26T00:00:00Z'), Date.parse('2026-03-05T05:00:00Z')];
  const baseMs = weeks[Math.floor(random() * weeks.length)] ?? mondayMs;
  const nowMs = baseMs + Math.floor(random() * 60) * 17 * 60_000;
  const logs = [25, 45].map((setTemperatureC, id) =>
    buildStability({ id, setTemperatureC, assessedAtMs: nowMs - 9 * dayMs, driftKPerH: 1e-4 }),
  );
  const whole = buildValidity({ startMs: nowMs - 200 * dayMs, endMs: nowMs + 200 * dayMs });
  const validity = () => [
    chance(0.2) ? { ...whole, endMs: nowMs + Math.floor(random() * 96) * hourMs } : whole,
  ];
  const chambers = [1, 2].map((id) =>
    buildChamber({
      id,
      tag: `C0${id}`,
      strictDoor: chance(0.6),
      assessments: logs,
      mappingDueOn: '2028-01-01',
      maxCells: chance(0.2) ? 2 : 20,
      unattended: chance(0.2) ? [] : buildChamber().unattended,
      validity: validity(),
    }),
  );
  const panels = chambers.flatMap((chamber) =>
    Array.from({ length: upTo(2) }, (_, half) =>
      buildWiredPanel(
        {
          id: chamber.id * 2 + half,
          chamber,
          size: upTo(3),
          leadResistanceOhm: 0.04 + 0.07 * half,
        },
        {
          source: { stabilityVPerH: 1e-8, validity: validity() },
          meter: {
            ranges: (
              buildWiredPanel({ id: 1, chamber, size: 1 }).meterChannels[0]?.ranges ?? []
            ).map((range) => ({ ...range, validity: validity() })),
          },
        },
      ),
    ),
  );
  const calendar = isToronto ? { ...officeHours, zone: 'America/Toronto' } : officeHours;
  let facility = buildWiredFacility(chambers, panels, { calendar });
  const draw = (): SlotRequest =>
    buildSlotRequest({
      cellCount: upTo(4),
      setTemperatureC: chance(0.5) ? 25 : 45,
      setToleranceK: 0,
      tolerance: { kind: 'relative', fraction: 0.3 },
      restedSinceMs: nowMs - 90 * dayMs,
      earliestStartMs: nowMs + Math.floor(random() * 30) * hourMs,
    });
  for (let id = 1; id <= 5; id += 1) {
    const request = draw();
    const options = { options: 1, nowMs, horizonMs: nowMs + 8 * dayMs };
    const [offer] = search(buildIndex(facility), request, options).offers;
    if (offer !== undefined) {
      const state = chance(0.6) ? 'open' : 'closed';
      facility = applyOffer(facility, request, { id, offer, state });
    }
  }
  const outages = facility.meterChannels
    .filter(() => chance(0.15))
    .map(({ unitId }): TakenSpan => {
      const startMs = nowMs + Math.floor(random() * 400) * 900_000;
      const endMs = startMs + upTo(40) * 900_000;
      return { unitId, startMs, endMs, by: 'outage', recordId: 1, label: 'outage 1' };
    });
  facility = { ...facility, allocations: [...facility.allocations, ...outages] };
  return { facility, request: draw(), nowMs, horizonMs: nowMs + 4 * dayMs };
}

const scenes = fc.integer({ min: 1, max: 1_000_000 }).map(drawScene);

describe('offers on random laboratories', () => {
  it('are the earliest of each chamber and day that a plain scan finds', () => {
    fc.assert(
      fc.property(scenes, ({ facility, request, nowMs, horizonMs }) => {
        const limits = { nowMs, horizonMs, options: 4 };
        const found = search(buildIndex(facility), request, limits).offers;
        const slots = found.map(({ startMs, endMs, chamberTag }) => ({
          startMs,
          endMs,
          chamberTag,
        }));
        expect(slots).toEqual(bruteSearch(facility, request, limits));
      }),
      { numRuns: 40 },
    );
  }, 120_000);

  it('pass every rule of a second, plain reading', () => {
    fc.assert(
      fc.property(scenes, ({ facility, request, nowMs, horizonMs }) => {
        const limits = { nowMs, horizonMs: horizonMs + 4 * dayMs };
        const { offers } = search(buildIndex(facility), request, { ...limits, options: 6 });
        for (const offer of offers) {
          expect(offerFaults(facility, request, offer, limits)).toEqual([]);
          expect(offer.checks.filter(({ outcome }) => outcome === 'stop')).toEqual([]);
        }
      }),
      { numRuns: 120 },
    );
  }, 120_000);

  it('a blocked earlier slot starts before the first offer and exactly one check stops it', () => {
    fc.assert(
      fc.property(scenes, ({ facility, request, nowMs, horizonMs }) => {
        const limits = { nowMs, horizonMs, options: 1 };
        const { offers, blockedEarlier } = search(buildIndex(facility), request, limits);
        if (blockedEarlier !== null) {
          expect(blockedEarlier.startMs).toBeLessThan(offers[0]?.startMs ?? Infinity);
          const stops = blockedEarlier.checks.filter(({ outcome }) => outcome === 'stop');
          expect(stops).toEqual([blockedEarlier.blockedBy]);
        }
      }),
      { numRuns: 120 },
    );
  }, 120_000);

  it('there is always an offer or a reason, never both', () => {
    fc.assert(
      fc.property(scenes, ({ facility, request, nowMs, horizonMs }) => {
        const { offers, reasons } = search(buildIndex(facility), request, {
          nowMs,
          horizonMs,
          options: 1,
        });
        expect(offers.length > 0).toBe(reasons.length === 0);
      }),
      { numRuns: 60 },
    );
  }, 120_000);
});
