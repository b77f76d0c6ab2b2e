import { defineRoute } from '#server/http/define-route.ts';
import * as contracts from '#shared/contracts/bookings.contract.ts';
import { getBooking, listBookings } from './bookings.service.ts';
import { cancelBooking } from './cancel-booking.service.ts';
import { confirmBooking } from './confirm-booking.service.ts';
import { moveBooking } from './move-booking.service.ts';

export const bookingsRoutes = [
  defineRoute(contracts.listBookings, ({ deps, actor, site, input }) =>
    listBookings(deps, actor, site, input.query),
  ),
  defineRoute(contracts.getBooking, ({ deps, actor, site, input }) =>
    getBooking(deps, actor, site, input.params.id),
  ),
  defineRoute(contracts.confirmBooking, ({ deps, actor, site, input }) =>
    confirmBooking(deps, actor, site, input.body),
  ),
  defineRoute(contracts.moveBooking, ({ deps, actor, site, input }) =>
    moveBooking(deps, actor, site, { bookingId: input.params.id, ...input.body }),
  ),
  defineRoute(contracts.cancelBooking, ({ deps, actor, site, input }) =>
    cancelBooking(deps, actor, site, { bookingId: input.params.id, ...input.body }),
  ),
];
