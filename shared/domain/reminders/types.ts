/** Why a person is written to: a lead time in days, the day itself, or a week overdue. */
export type ReminderReason = `lead-${number}` | 'due' | `overdue-${number}`;
