import { stopEffect } from '#shared/domain/checks/stop-effect.ts';
import { checkCodes } from '#shared/domain/checks/types.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';
import type { SlotRequest } from './types.ts';

/**
 * A set of check codes as bits, so that the search can ask in one step what stops a channel.
 *
 * @example checkBits(['double-use']) // 1
 */
export function checkBits(codes: readonly CheckCode[]): number {
  return codes.reduce((bits, code) => bits | (1 << checkCodes.indexOf(code)), 0);
}

/**
 * The codes whose stop would really stop this request, as bits: not softened, not lifted to the end.
 *
 * @param endMs end of the slot, epoch ms
 * @example stoppingBits({ grade: 'reported', deviations: [] }, 0) // all bits
 */
export function stoppingBits(
  request: Pick<SlotRequest, 'grade' | 'deviations'>,
  endMs: number,
): number {
  return checkBits(checkCodes.filter((code) => stopEffect(code, request, endMs).kind === 'stops'));
}

/**
 * The same for a slot at any time, as if no deviation ever expired: the fewest rules that can stop.
 *
 * @example foreverStoppingBits({ grade: 'reported', deviations: [] }) // all bits
 */
export function foreverStoppingBits(request: Pick<SlotRequest, 'grade' | 'deviations'>): number {
  const deviations = request.deviations.map((deviation) => ({
    ...deviation,
    expiresAtMs: Infinity,
  }));
  return stoppingBits({ ...request, deviations }, 0);
}
