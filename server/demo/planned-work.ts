import type { PhaseSpan } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import type { Grade } from '#shared/domain/states.ts';
import type { Batch } from './cells.ts';
import type { Aim, BookingEstimate } from './estimate-booking.ts';
import type { Needs } from './lay-phases.ts';
import type { DemoChamber, DemoPath } from './wiring.ts';

/** A booking before it has a number. */
export type PlannedBooking = {
  readonly batch: Batch;
  readonly cellIds: readonly number[];
  readonly paths: readonly DemoPath[];
  readonly aim: Aim;
  readonly grade: Grade;
  readonly estimate: BookingEstimate;
  readonly needs: Needs;
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
