import type { CalibratedFunction, Conformity } from '#shared/domain/states.ts';

/** What one calibration vouches for; `rangeId` null means the function has no ranges. */
export type CalibrationScope = {
  readonly channelId: number;
  readonly function: CalibratedFunction;
  readonly rangeId: number | null;
  readonly conformityAsLeft: Conformity;
  /** What the scope is limited to, as a short phrase; null = not limited. */
  readonly limitation: string | null;
};

/** An approved calibration as it is kept. Drafts and refused ones are never passed in. */
export type ApprovedCalibration = {
  readonly id: number;
  /** `YYYY-MM-DD` at the instrument's site. */
  readonly performedOn: string;
  /** Last valid day, `YYYY-MM-DD` at the instrument's site. */
  readonly dueOn: string;
  readonly approvedAtMs: number;
  /** The approved calibration that this one corrects; that one no longer counts. */
  readonly replacesId: number | null;
  /** Latest approved extension of the due day, if any. */
  readonly extendedDueOn: string | null;
  readonly scopes: readonly CalibrationScope[];
};

/** A time during which a channel (or all channels: null) cannot be vouched for. */
export type ValidityBreak = {
  readonly channelId: number | null;
  readonly startMs: number;
  /** Null: nobody knows when it ends. */
  readonly endMs: number | null;
};

/** Channel × function × range: the thing that is valid or not. */
export type ValidityKey = {
  readonly channelId: number;
  readonly function: CalibratedFunction;
  readonly rangeId: number | null;
};
