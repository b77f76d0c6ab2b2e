import { policyDefinitions } from './site-policy.ts';
import type { PolicyDefinition, PolicyKey, PolicyValue } from './site-policy.ts';

/** Either the value is fit for the policy, or a sentence says why not. */
export type PolicyJudgement =
  | { readonly kind: 'fit'; readonly value: PolicyValue }
  | { readonly kind: 'unfit'; readonly reason: string };

/**
 * Holds a value against the kind and limits of a policy, in the policy's own unit.
 *
 * @example
 * judgePolicyValue('safePercentile', 99); // { kind: 'unfit', reason: 'Give a whole number from 50 to 95 %.' }
 */
export function judgePolicyValue(key: PolicyKey, value: unknown): PolicyJudgement {
  const definition: PolicyDefinition = policyDefinitions[key];
  switch (definition.kind) {
    case 'number':
      return typeof value === 'number' && isWithin(definition, value)
        ? { kind: 'fit', value }
        : { kind: 'unfit', reason: numberReason(definition) };
    case 'flag':
      return typeof value === 'boolean'
        ? { kind: 'fit', value }
        : { kind: 'unfit', reason: 'Give yes or no.' };
    case 'outcome':
      return value === 'caution' || value === 'stop'
        ? { kind: 'fit', value }
        : { kind: 'unfit', reason: 'Give either caution or stop.' };
    case 'days':
      return judgeDays(definition, value);
  }
}

function isWithin(
  limits: { readonly min: number; readonly max: number; readonly isWhole: boolean },
  value: number,
): boolean {
  return value >= limits.min && value <= limits.max && (!limits.isWhole || Number.isInteger(value));
}

function numberReason(definition: Extract<PolicyDefinition, { kind: 'number' }>): string {
  const sort = definition.isWhole ? 'a whole number' : 'a number';
  return `Give ${sort} from ${definition.min} to ${definition.max} ${definition.unit}.`;
}

function judgeDays(
  definition: Extract<PolicyDefinition, { kind: 'days' }>,
  value: unknown,
): PolicyJudgement {
  const limits = { ...definition, isWhole: true };
  const days = Array.isArray(value) ? value.filter((day) => typeof day === 'number') : [];
  const isFit =
    Array.isArray(value) &&
    days.length === value.length &&
    days.length >= 1 &&
    days.length <= 8 &&
    new Set(days).size === days.length &&
    days.every((day) => isWithin(limits, day));
  return isFit
    ? { kind: 'fit', value: days.toSorted((left, right) => right - left) }
    : {
        kind: 'unfit',
        reason: `Give one to eight different whole numbers from ${definition.min} to ${definition.max} days.`,
      };
}
