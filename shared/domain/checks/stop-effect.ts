import type { SlotRequest } from '#shared/domain/availability/types.ts';
import { checkRules } from './check-rules.ts';
import type { CheckCode } from './types.ts';

export type StopEffect =
  | { readonly kind: 'stops' }
  | { readonly kind: 'softened' }
  | { readonly kind: 'lifted'; readonly deviationId: number };

/**
 * What a stop of a check amounts to for a request: it stops, it is softened because the work is
 * indicative, or a deviation that is in force to the end of the slot lifts it.
 *
 * @param endMs end of the slot, epoch ms; a deviation must not expire before it
 * @example stopEffect('rest-time', { grade: 'indicative', deviations: [] }, 0).kind // 'softened'
 */
export function stopEffect(
  code: CheckCode,
  request: Pick<SlotRequest, 'grade' | 'deviations'>,
  endMs: number,
): StopEffect {
  const rule = checkRules[code];
  if (rule.softensForIndicative && request.grade === 'indicative') {
    return { kind: 'softened' };
  }
  if (rule.isNeverLifted) {
    return { kind: 'stops' };
  }
  const deviation = request.deviations.find(
    (candidate) => candidate.code === code && candidate.expiresAtMs >= endMs,
  );
  return deviation === undefined
    ? { kind: 'stops' }
    : { kind: 'lifted', deviationId: deviation.id };
}
