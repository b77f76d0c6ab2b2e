import { performance } from 'node:perf_hooks';
import { buildIndex } from '#shared/domain/availability/build-index.ts';
import { search } from '#shared/domain/availability/search.ts';
import type { SlotRequest } from '#shared/domain/availability/types.ts';
import type { Chamber, Facility } from '#shared/domain/facility/types.ts';
import { applyOffer } from '#tests/support/apply-offer.ts';
import {
  buildChamber,
  buildSlotRequest,
  buildStability,
  buildWiredFacility,
  buildWiredPanel,
  dayMs,
  hourMs,
  mondayMs,
} from '#tests/support/build-facility.ts';
import { seededRandom } from '#tests/support/seeded-random.ts';

// The three earliest slots on a site of 10 chambers and 160 positions with 200 bookings over six
// weeks: request to answer, in one process, the facility as it would be read from storage.
const random = seededRandom(7);
const nowMs = mondayMs + 9 * hourMs;
const horizonMs = nowMs + 42 * dayMs;
const pick = <Value>(values: readonly [Value, ...Value[]]): Value =>
  values[Math.floor(random() * values.length)] ?? values[0];

function buildSite(): Facility {
  const chambers: readonly Chamber[] = Array.from({ length: 10 }, (_, place) =>
    buildChamber({
      id: place + 1,
      tag: `C${String(place + 1).padStart(2, '0')}`,
      strictDoor: place % 3 !== 0,
      assessments: [15, 25, 35, 45].map((setTemperatureC, logged) =>
        buildStability({
          id: place * 10 + logged,
          setTemperatureC,
          driftKPerH: place % 4 === 3 ? 0.02 : 0.0005,
        }),
      ),
    }),
  );
  const panels = chambers.flatMap((chamber) =>
    [1, 2].map((half) =>
      buildWiredPanel({
        id: chamber.id * 2 + half,
        chamber,
        size: 8,
        leadResistanceOhm: half === 1 ? 0.05 : 0.09,
      }),
    ),
  );
  return buildWiredFacility(chambers, panels);
}

function drawRequest(earliestStartMs: number): SlotRequest {
  return buildSlotRequest({
    kind: pick(['settled', 'settled', 'screening']),
    cellCount: pick([2, 4, 6, 8, 12, 16]),
    setTemperatureC: pick([15, 25, 35, 45]),
    earliestStartMs,
  });
}

function fill(bookings: number): Facility {
  let facility = buildSite();
  for (let id = 1; id <= bookings; id += 1) {
    const request = drawRequest(nowMs + random() * 35 * dayMs);
    const options = { options: 1, nowMs, horizonMs: horizonMs + 30 * dayMs };
    const [offer] = search(buildIndex(facility), request, options).offers;
    if (offer !== undefined) {
      const state = pick<'open' | 'closed'>(['open', 'closed', 'closed']);
      facility = applyOffer(facility, request, { id, offer, state });
    }
  }
  return facility;
}

function measure(facility: Facility, requests: readonly SlotRequest[]): readonly number[] {
  const times = requests.map((request) => {
    const startedMs = performance.now();
    search(buildIndex(facility), request, { options: 3, nowMs, horizonMs });
    return performance.now() - startedMs;
  });
  return times.toSorted((first, second) => first - second);
}

function print(name: string, sorted: readonly number[], share: number): void {
  const value = sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * share))] ?? NaN;
  const line = { name, value: Number(value.toFixed(2)), unit: 'ms', limit: { max: 300 } };
  process.stdout.write(`${JSON.stringify(line)}\n`);
}

const facility = fill(200);
const drawn = Array.from({ length: 150 }, () => drawRequest(nowMs));
measure(facility, drawn.slice(0, 20));
const usual = measure(facility, drawn);
print('offers.core.p50', usual, 0.5);
print('offers.core.p95', usual, 0.95);
// Requests that nothing satisfies: the whole horizon is looked at, and the reasons are worked out.
const hopeless = drawn.slice(0, 40).map((request, place) => ({
  ...request,
  ...(place % 2 === 0
    ? { cellCount: 17 }
    : { limits: { ...request.limits, openCircuitVoltageV: 8, maxVoltageV: 9 } }),
}));
print('offers.core.none.p95', measure(facility, hopeless), 0.95);
const unattended = {
  ...facility,
  chambers: facility.chambers.map((chamber) => ({ ...chamber, unattended: [], maxCells: 3 })),
};
print('offers.core.two-stops.p95', measure(unattended, drawn.slice(0, 40)), 0.95);
