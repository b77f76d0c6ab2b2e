import type { PhaseSpan } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import type { Grade } from '#shared/domain/states.ts';
import type { DemoRange } from './channel-plan.ts';
import type { Batch } from './cells.ts';
import type { Aim, BookingEstimate } from './estimate-booking.ts';
import type { PhaseNeeds } from '#shared/domain/availability/needs-of-estimate.ts';
import type { DemoChamber, DemoPath } from './wiring.ts';

/** A booking before it has a number. */
export type PlannedBooking = {
  readonly batch: Batch;
  readonly cellIds: readonly number[];
  readonly paths: readonly DemoPath[];
  /** The meter range of each path. */
  readonly ranges: readonly DemoRange[];
  readonly aim: Aim;
  readonly grade: Grade;
  readonly estimate: BookingEstimate;
  readonly needs: PhaseNeeds;
};

/** A load before it has a number; cancelled ones take nothing. */
export type PlannedLoad = {
  readonly chamber: DemoChamber;
  readonly setC: number;
  readonly span: Span;
  readonly phases: readonly PhaseSpan[];
  readonly bookings: readonly PlannedBooking[];
  readonly cancelReason: string | null;
};
