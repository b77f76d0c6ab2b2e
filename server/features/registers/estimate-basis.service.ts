import type { z } from 'zod';
import type { SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { getSitePolicy, getWorkingCalendar } from '#server/features/settings/settings.service.ts';
import type { getEstimateBasis as contract } from '#shared/contracts/registers.contract.ts';
import type { DayHours, WorkingCalendar } from '#shared/domain/facility/types.ts';
import { facilityPolicyOf } from '#shared/domain/policies/facility-policy-of.ts';
import { listWiringRecords } from './registers.repository.ts';

type Basis = z.input<typeof contract.response>;

/** A re-cabled path costs five minutes; an estimate before a path is chosen has none. */
const recableMinPerPath = 5;

/**
 * What an estimate rests on before a path is chosen: the site's lead resistance by policy, and the
 * source and range in the middle of what the site has. An offer estimates again over its real path.
 */
export async function getEstimateBasis(deps: Pick<Deps, 'db'>, site: SiteScope): Promise<Basis> {
  const policy = facilityPolicyOf(await getSitePolicy(deps, site.id));
  const calendar = await getWorkingCalendar(deps, site.id);
  const records = await listWiringRecords(deps.db, site.id);
  const chamber = middle(records.chambers);
  return {
    wiring: referenceWiring(site, records, policy.referenceLeadResistanceOhm),
    process: {
      connectFixedMin: policy.connectFixedMin,
      connectPerCellMin: policy.connectPerCellMin,
      unloadFixedMin: policy.unloadFixedMin,
      unloadPerCellMin: policy.unloadPerCellMin,
      recabledPaths: 0,
      recableMinPerPath,
      matchMin: policy.matchMin,
      matchAttended: policy.matchAttended,
      minimumMeasureMin: policy.minimumMeasureMin,
      safePercentile: policy.safePercentile,
    },
    chamber: {
      idleTemperatureC: (chamber?.idleTempMdegc ?? 25_000) / 1000,
      rampKPerMin: chamber?.rampKPerMin ?? 1,
    },
    holderFactor: 1,
    // The search learns from no run yet, and an estimate before it must not promise other lengths.
    learnedRatios: null,
    staffedHours: describeWeek(calendar),
    zone: site.zone,
  };
}

function referenceWiring(
  site: SiteScope,
  records: Awaited<ReturnType<typeof listWiringRecords>>,
  leadResistanceOhm: number,
): Basis['wiring'] {
  const known = records.ranges.filter(({ range }) => range.burdenOhm !== null);
  const range = middle(known.length > 0 ? known : records.ranges)?.range;
  const label = `reference wiring of ${site.name}`;
  const source = { leadResistanceOhm, sourceOutputOhm: middle(records.sourceOutputs)?.ohm ?? 0 };
  if (range === undefined) {
    // Without a meter on record nothing is known of a burden: the estimate says so and stops.
    return {
      ...source,
      label,
      burdenOhm: null,
      burdenInsideLoop: null,
      meterNoiseA: 0,
      meterResolutionA: 0,
      sampleIntervalS: 1,
    };
  }
  return {
    ...source,
    label: `${label}, ${range.label} range`,
    burdenOhm: range.burdenOhm,
    burdenInsideLoop: range.burdenInsideLoop,
    meterNoiseA: range.noiseA,
    meterResolutionA: range.resolutionA,
    sampleIntervalS: range.sampleIntervalS,
  };
}

function middle<Row>(rows: readonly Row[]): Row | undefined {
  return rows[Math.floor(rows.length / 2)];
}

const dayNames = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'];

/** `Mon to Fri 08:00-18:00`: days of equal hours that follow each other are said once. */
export function describeWeek(calendar: Pick<WorkingCalendar, 'weekly'>): string {
  const groups: { first: number; last: number; text: string }[] = [];
  for (let day = 1; day <= 7; day += 1) {
    const text = describeHours(calendar.weekly[day] ?? []);
    const group = groups.at(-1);
    if (group?.text === text) {
      group.last = day;
    } else {
      groups.push({ first: day, last: day, text });
    }
  }
  const name = (day: number) => dayNames[day - 1] ?? '';
  const worked = groups
    .filter(({ text }) => text !== '')
    .map(({ first, last, text }) =>
      first === last ? `${name(first)} ${text}` : `${name(first)} to ${name(last)} ${text}`,
    );
  return worked.length === 0 ? 'nobody works here' : worked.join('; ');
}

function describeHours(hours: readonly DayHours[]): string {
  const clock = (minute: number) =>
    `${String(Math.floor(minute / 60)).padStart(2, '0')}:${String(minute % 60).padStart(2, '0')}`;
  return hours.map(({ fromMin, toMin }) => `${clock(fromMin)}-${clock(toMin)}`).join(', ');
}
