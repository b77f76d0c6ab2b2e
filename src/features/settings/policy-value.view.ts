import type { PolicyDto } from '#shared/contracts/settings.contract.ts';
import { formatNumber, parseFigure, thinSpace } from '#src/lib/format-number.ts';
import { t } from '#src/texts/t.ts';

type Value = PolicyDto['value'];
type Kinded = Pick<PolicyDto, 'kind' | 'unit'>;

function figure(value: number): string {
  const decimals = Number.isInteger(value) ? 0 : 3;
  return formatNumber(value, { decimals }).replace(/(\.\d*?)0+$/, '$1');
}

/** A policy's value in words, with its unit. */
export function describeValue(policy: Kinded, value: Value): string {
  const unit = policy.unit === null ? '' : `${thinSpace}${policy.unit}`;
  if (Array.isArray(value)) {
    return `${value.map(figure).join(', ')}${unit}`;
  }
  if (typeof value === 'boolean') {
    return value ? t.settings.yes : t.settings.no;
  }
  return typeof value === 'number' ? `${figure(value)}${unit}` : value;
}

/** What stands in the field when one begins to change it. */
export function toField(value: Value): string {
  return Array.isArray(value) ? value.join(', ') : String(value);
}

/** What was typed, as the policy takes it; the server judges whether it fits. */
export function fromField(kind: PolicyDto['kind'], text: string): Value {
  switch (kind) {
    case 'flag':
      return text === 'true';
    case 'number':
      return parseFigure(text) ?? text;
    case 'days': {
      const parts = text.split(',').filter((part) => part.trim() !== '');
      const days = parts.map(parseFigure).filter((day) => day !== undefined);
      return days.length === parts.length ? days : text;
    }
    case 'outcome':
      return text;
  }
}

/** `min to max unit`, empty where the kind has no limits. */
export function describeLimits(policy: PolicyDto): string {
  return policy.min === null || policy.max === null
    ? ''
    : t.settings.between(figure(policy.min), describeValue(policy, policy.max));
}
