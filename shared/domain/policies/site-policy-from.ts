import { judgePolicyValue } from './judge-policy-value.ts';
import { isPolicyKey, policyDefinitions } from './site-policy.ts';
import type { PolicyKey, PolicyValue, SitePolicy } from './site-policy.ts';

/** One value a site has set. */
export type SetPolicy = { readonly key: string; readonly value: unknown };

/**
 * The policy of a site: what it set, and the default of everything else. A stored value that no longer
 * fits its limits (they were narrowed since) counts as not set.
 *
 * @example
 * sitePolicyFrom([{ key: 'safePercentile', value: 80 }]).safePercentile; // 80
 * sitePolicyFrom([]).safePercentile; // 90
 */
export function sitePolicyFrom(set: readonly SetPolicy[]): SitePolicy {
  const valueOf = new Map<PolicyKey, PolicyValue>();
  for (const { key, value } of set) {
    const judgement = isPolicyKey(key) ? judgePolicyValue(key, value) : null;
    if (isPolicyKey(key) && judgement?.kind === 'fit') {
      valueOf.set(key, judgement.value);
    }
  }
  const number = (key: PolicyKey, fallback: number): number => {
    const value = valueOf.get(key);
    return typeof value === 'number' ? value : fallback;
  };
  const flag = (key: PolicyKey, fallback: boolean): boolean => {
    const value = valueOf.get(key);
    return typeof value === 'boolean' ? value : fallback;
  };
  const outcome = valueOf.get('logCannotTellOutcome');
  const days = valueOf.get('reminderLeadDays');
  const d = policyDefinitions;
  return {
    safePercentile: number('safePercentile', d.safePercentile.fallback),
    maxHoldHours: number('maxHoldHours', d.maxHoldHours.fallback),
    horizonDays: number('horizonDays', d.horizonDays.fallback),
    noShowHours: number('noShowHours', d.noShowHours.fallback),
    stabilityMaxAgeDays: number('stabilityMaxAgeDays', d.stabilityMaxAgeDays.fallback),
    stabilityTemperatureWindowK: number(
      'stabilityTemperatureWindowK',
      d.stabilityTemperatureWindowK.fallback,
    ),
    logCannotTellOutcome:
      outcome === 'caution' || outcome === 'stop' ? outcome : d.logCannotTellOutcome.fallback,
    engineersMayConfirm: flag('engineersMayConfirm', d.engineersMayConfirm.fallback),
    matchAttended: flag('matchAttended', d.matchAttended.fallback),
    connectFixedMin: number('connectFixedMin', d.connectFixedMin.fallback),
    connectPerCellMin: number('connectPerCellMin', d.connectPerCellMin.fallback),
    unloadFixedMin: number('unloadFixedMin', d.unloadFixedMin.fallback),
    unloadPerCellMin: number('unloadPerCellMin', d.unloadPerCellMin.fallback),
    matchMin: number('matchMin', d.matchMin.fallback),
    minimumMeasureMin: number('minimumMeasureMin', d.minimumMeasureMin.fallback),
    referenceLeadResistanceOhm: number(
      'referenceLeadResistanceOhm',
      d.referenceLeadResistanceOhm.fallback,
    ),
    reminderLeadDays: typeof days === 'object' ? days : d.reminderLeadDays.fallback,
  };
}
