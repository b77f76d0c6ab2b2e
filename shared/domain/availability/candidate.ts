import type { CheckCode, PlacementFacts } from '#shared/domain/checks/types.ts';
import type { FacilityIndex, Load } from '#shared/domain/facility/types.ts';
import type { PreparedChamber } from './prepared.ts';
import type { SlotRequest } from './types.ts';

/** What stays the same over one search. */
export type SearchContext = {
  readonly index: FacilityIndex;
  readonly request: SlotRequest;
  readonly nowMs: number;
  readonly horizonMs: number;
  /** A booking that is placed again: its own allocations and load do not count. */
  readonly ignoreBookingId: number | null;
  /** Codes whose stop stops this request in a slot that ends then, as bits. */
  readonly stopping: (endMs: number) => number;
  /** Forecasts already made, by source, wiring, window and log. */
  readonly forecasts: Map<string, boolean>;
};

/** One place to look at: a chamber at a set temperature from a start, in a new load or joining one. */
export type Candidate = {
  readonly prepared: PreparedChamber;
  readonly startMs: number;
  readonly joins: Load | null;
};

/** A candidate laid out with one wiring: its facts still without paths, or what keeps it from that. */
export type LaidOut =
  | { readonly kind: 'laid-out'; readonly facts: PlacementFacts }
  | { readonly kind: 'no-time' }
  | { readonly kind: 'clash'; readonly facts: PlacementFacts; readonly code: CheckCode };
