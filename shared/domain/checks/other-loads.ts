import type { Chamber, Load } from '#shared/domain/facility/types.ts';

/**
 * The live loads of a chamber other than the one joined, and without the one that holds nothing but
 * the booking being re-checked.
 *
 * @example otherLoads({ chamber, joins: null, ignoreBookingId: null }) // all that are not cancelled
 */
export function otherLoads(facts: {
  readonly chamber: Chamber;
  readonly joins: Load | null;
  readonly ignoreBookingId: number | null;
}): readonly Load[] {
  const { joins, ignoreBookingId } = facts;
  return facts.chamber.loads.filter(
    (load) =>
      load.state !== 'cancelled' &&
      load.id !== joins?.id &&
      !(
        ignoreBookingId !== null &&
        load.members.length > 0 &&
        load.members.every((member) => member.bookingId === ignoreBookingId)
      ),
  );
}
