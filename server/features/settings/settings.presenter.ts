import type { PolicyDto, WorkingHoursDto } from '#shared/contracts/settings.contract.ts';
import type { DayHours, WorkingCalendar } from '#shared/domain/facility/types.ts';
import { policyDefinitions } from '#shared/domain/policies/site-policy.ts';
import type {
  PolicyDefinition,
  PolicyKey,
  PolicyValue,
  SitePolicy,
} from '#shared/domain/policies/site-policy.ts';
import type { HoursRows, SettingRow } from './settings.repository.ts';

export function presentPolicy(
  key: PolicyKey,
  policy: SitePolicy,
  row: SettingRow | undefined,
): PolicyDto {
  const definition: PolicyDefinition = policyDefinitions[key];
  return {
    key,
    label: definition.label,
    kind: definition.kind,
    value: asSent(policy[key]),
    fallback: asSent(definition.fallback),
    ...presentLimits(definition),
    version: row?.version ?? 0,
    changedAt: row?.updatedAt.toISOString() ?? null,
    changedBy: row?.changedBy ?? null,
  };
}

function presentLimits(
  definition: PolicyDefinition,
): Pick<PolicyDto, 'unit' | 'min' | 'max' | 'isWhole'> {
  if (definition.kind !== 'number' && definition.kind !== 'days') {
    return { unit: null, min: null, max: null, isWhole: false };
  }
  const { unit, min, max } = definition;
  return { unit, min, max, isWhole: definition.kind === 'days' || definition.isWhole };
}

function asSent(value: PolicyValue): PolicyDto['value'] {
  return typeof value === 'object' ? [...value] : value;
}

const weekdays = ['1', '2', '3', '4', '5', '6', '7'] as const;

export function presentWorkingHours({ site, exceptions }: HoursRows): WorkingHoursDto {
  return {
    zone: site.zone,
    weekly: weekdays.map((day) => copyDay(site.workingHours[day] ?? [])),
    exceptions: exceptions.map(({ day, hours, reason }) => ({
      day,
      hours: copyDay(hours),
      reason,
    })),
    version: site.version,
  };
}

/** The same hours as the core reads them: ISO weekday numbers, Monday = 1. */
export function toWorkingCalendar({ site, exceptions }: HoursRows): WorkingCalendar {
  return {
    zone: site.zone,
    weekly: site.workingHours,
    exceptions: exceptions.map(({ day, hours, reason }) => ({ day, hours, reason })),
  };
}

function copyDay(hours: readonly DayHours[]) {
  return hours.map(({ fromMin, toMin }) => ({ fromMin, toMin }));
}
