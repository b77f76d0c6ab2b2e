import type { CheckCode, CheckResult, PathChoice } from '#shared/domain/checks/types.ts';
import type { PhaseSpan } from '#shared/domain/facility/types.ts';
import type {
  EstimateCell,
  MeasurementKind,
  RatioPosterior,
  SlotEstimate,
  Tolerance,
} from '#shared/domain/hold-estimate/types.ts';

export type Grade = 'reported' | 'indicative';

/** A request as the search sees it: one lot of equal cells at one set temperature. */
export type SlotRequest = {
  readonly requestId: number | null;
  readonly kind: MeasurementKind;
  readonly grade: Grade;
  readonly cellTypeName: string;
  readonly cellCount: number;
  readonly cell: EstimateCell;
  readonly limits: CellLimits;
  readonly tolerance: Tolerance;
  readonly screening: {
    readonly badToGoodRatio: number;
    readonly falseAlarm: number;
    readonly miss: number;
  };
  readonly setTemperatureC: number;
  readonly setToleranceK: number;
  readonly earliestStartMs: number;
  readonly neededByMs: number | null;
  /** False: at least one cell has not arrived; the booking would be tentative. */
  readonly cellsReceived: boolean;
  readonly cellsDamaged: boolean;
  /** Last charge or discharge of the least rested cell; null = not stated. */
  readonly restedSinceMs: number | null;
  /** What runs of this cell type have taught about the hold; left out = the prior. */
  readonly learnedRatios?: RatioPosterior | null;
  /** Checks lifted by a deviation in force. */
  readonly deviations: readonly {
    readonly id: number;
    readonly code: CheckCode;
    readonly expiresAtMs: number;
  }[];
};

export type CellLimits = {
  readonly released: boolean;
  readonly hazardLevel: number;
  readonly minTemperatureC: number;
  readonly maxTemperatureC: number;
  readonly minVoltageV: number;
  readonly maxVoltageV: number;
  /** Expected open-circuit voltage while held, if known. */
  readonly openCircuitVoltageV: number | null;
  readonly energyWh: number;
  /** Percent. */
  readonly maxHoldStateOfCharge: number;
};

export type SearchOptions = {
  /** How many offers are wanted. */
  readonly options: number;
  /** The instant by which a slot must have ended, epoch ms. */
  readonly horizonMs: number;
  readonly nowMs: number;
};

export type Offer = {
  readonly startMs: number;
  readonly endMs: number;
  readonly chamberId: number;
  readonly chamberTag: string;
  readonly joinsLoadId: number | null;
  readonly setTemperatureC: number;
  readonly paths: readonly PathChoice[];
  /** The phases of the load with this booking in it. */
  readonly phases: readonly PhaseSpan[];
  /** Seconds spent in `wait`. */
  readonly waitS: number;
  readonly estimate: SlotEstimate;
  readonly checks: readonly CheckResult[];
};

/** An earlier slot that exactly one rule blocks. */
export type BlockedOffer = Offer & { readonly blockedBy: CheckResult };

export type NoOfferReason = {
  /** The rule that blocks most places, or `no-path` where nothing is wired for it. */
  readonly code: CheckCode | 'no-path' | 'not-estimable' | 'no-time';
  readonly sentence: string;
  readonly chambers: readonly string[];
};

export type SearchResult = {
  readonly offers: readonly Offer[];
  readonly blockedEarlier: BlockedOffer | null;
  /** Filled when there is no offer: why, the most frequent reason first. */
  readonly reasons: readonly NoOfferReason[];
  readonly startsLookedAt: number;
};
