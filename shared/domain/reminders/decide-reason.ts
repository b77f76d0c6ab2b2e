import { daysUntil } from './days-until.ts';
import type { ReminderReason } from './types.ts';

/**
 * The reason for which a duty calls for a reminder on a day, or null. Only the nearest reason counts:
 * whatever was missed before, in a time without reminders or because the duty is new, is passed over.
 * Ahead of the due day it is the smallest lead time not shorter than the days left; on the due day and
 * in the six days after it is that day; then each full week overdue.
 *
 * @param input.dueOn `YYYY-MM-DD` at the instrument's site
 * @param input.today `YYYY-MM-DD` at the same site
 * @param input.leadDays days ahead at which reminders go out, in any order
 * @param input.sent reasons for which the person was already written to about this due day
 * @throws RangeError when a day is not a calendar day
 * @example
 * decideReason({ dueOn: '2026-03-20', today: '2026-03-10', leadDays: [30, 14, 7, 1], sent: ['lead-30'] });
 * // 'lead-14': ten days are left
 */
export function decideReason(input: {
  readonly dueOn: string;
  readonly today: string;
  readonly leadDays: readonly number[];
  readonly sent: readonly string[];
}): ReminderReason | null {
  const reason = nearestReason(daysUntil(input.today, input.dueOn), input.leadDays);
  return reason === null || input.sent.includes(reason) ? null : reason;
}

function nearestReason(daysLeft: number, leadDays: readonly number[]): ReminderReason | null {
  if (daysLeft > 0) {
    const reached = leadDays.filter((lead) => lead >= daysLeft);
    return reached.length === 0 ? null : `lead-${Math.min(...reached)}`;
  }
  const weeksOverdue = Math.floor(-daysLeft / 7);
  return weeksOverdue === 0 ? 'due' : `overdue-${weeksOverdue}`;
}
