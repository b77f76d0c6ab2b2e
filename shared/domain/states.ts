// Lists that the estimate and the checks own are passed on under the storage's names, so that tables,
// contracts and core read one array.
export {
  cellClasses,
  cellFormats,
  chemistries,
  loadPhases as phases,
  measurementKinds as requestKinds,
  type CellClass,
  type CellFormat,
  type Chemistry,
  type LoadPhase as Phase,
  type MeasurementKind as RequestKind,
} from '#shared/domain/hold-estimate/types.ts';
export { checkOutcomes, type CheckOutcome } from '#shared/domain/checks/types.ts';

/** Where a role grant comes from: the identity provider's claim or an administrator. */
export const grantOrigins = ['claim', 'local'] as const;
/** One of {@link grantOrigins}. */
export type GrantOrigin = (typeof grantOrigins)[number];

/** What a piece of equipment is. A mainframe only carries other instruments. */
export const instrumentKinds = [
  'source',
  'meter',
  'chamber',
  'logger',
  'probe',
  'standard',
  'check-standard',
  'fixture',
  'mainframe',
] as const;
/** One of {@link instrumentKinds}. */
export type InstrumentKind = (typeof instrumentKinds)[number];

/** The life of an instrument. Only one in service may be booked. */
export const instrumentStates = [
  'awaiting-release',
  'in-service',
  'out-of-service',
  'retired',
] as const;
/** One of {@link instrumentStates}. */
export type InstrumentState = (typeof instrumentStates)[number];

/** What a channel does. */
export const channelFunctions = ['source', 'measure'] as const;
/** One of {@link channelFunctions}. */
export type ChannelFunction = (typeof channelFunctions)[number];

/** What a calibration vouches for: sourcing a voltage, measuring a current, a temperature. */
export const calibratedFunctions = ['source', 'measure', 'temperature'] as const;
/** One of {@link calibratedFunctions}. */
export type CalibratedFunction = (typeof calibratedFunctions)[number];

/** The smallest things that are taken exclusively. */
export const unitKinds = ['source-channel', 'meter-channel', 'chamber-position'] as const;
/** One of {@link unitKinds}. */
export type UnitKind = (typeof unitKinds)[number];

/** Why something cannot be used although nobody planned it. */
export const unavailabilityReasons = [
  'breakdown',
  'withdrawn',
  'failed-calibration',
  'other',
] as const;
/** One of {@link unavailabilityReasons}. */
export type UnavailabilityReason = (typeof unavailabilityReasons)[number];

/** The life of a planned outage. */
export const outageStates = ['planned', 'done', 'cancelled'] as const;
/** One of {@link outageStates}. */
export type OutageState = (typeof outageStates)[number];

/** The life of a cell type: only a released one may be booked. */
export const cellTypeStates = ['draft', 'released'] as const;
/** One of {@link cellTypeStates}. */
export type CellTypeState = (typeof cellTypeStates)[number];

/** Where a cell is in its life at the laboratory. */
export const cellStatuses = [
  'announced',
  'received',
  'in-test',
  'stored',
  'quarantined',
  'returned',
  'disposed',
] as const;
/** One of {@link cellStatuses}. */
export type CellStatus = (typeof cellStatuses)[number];

/** How a cell looked on receipt or at the last inspection. */
export const cellConditions = ['good', 'suspicious', 'damaged'] as const;
/** One of {@link cellConditions}. */
export type CellCondition = (typeof cellConditions)[number];

/** The direction of the last charge movement before a rest. */
export const chargeDirections = ['charge', 'discharge'] as const;
/** One of {@link chargeDirections}. */
export type ChargeDirection = (typeof chargeDirections)[number];

/** How much a result must bear: reported work passes every check, indicative work is marked. */
export const grades = ['reported', 'indicative'] as const;
/** One of {@link grades}. */
export type Grade = (typeof grades)[number];

/** The life of a request. */
export const requestStates = [
  'draft',
  'submitted',
  'partly-booked',
  'booked',
  'done',
  'withdrawn',
] as const;
/** One of {@link requestStates}. */
export type RequestState = (typeof requestStates)[number];

/** How the tolerance of a settled value is stated: a share of the current, or amperes. */
export const toleranceKinds = ['relative', 'absolute'] as const;
/** One of {@link toleranceKinds}. */
export type ToleranceKind = (typeof toleranceKinds)[number];

/** How urgent a request is among others. */
export const priorities = ['low', 'normal', 'high'] as const;
/** One of {@link priorities}. */
export type Priority = (typeof priorities)[number];

/** The life of a chamber load. */
export const loadStates = ['open', 'closed', 'running', 'done', 'cancelled'] as const;
/** One of {@link loadStates}. */
export type LoadState = (typeof loadStates)[number];

/** The life of a booking. */
export const bookingStates = ['tentative', 'confirmed', 'running', 'done', 'cancelled'] as const;
/** One of {@link bookingStates}. */
export type BookingState = (typeof bookingStates)[number];

/** When a booking's checks were run. */
export const checkStages = ['offer', 'confirm', 'recheck'] as const;
/** One of {@link checkStages}. */
export type CheckStage = (typeof checkStages)[number];

/** Why a run ended; a run stopped because of how it looked teaches the estimate differently. */
export const runEndReasons = [
  'completed',
  'stopped-unsettled',
  'stopped-looked-bad',
  'stopped-nearly-settled',
  'aborted',
] as const;
/** One of {@link runEndReasons}. */
export type RunEndReason = (typeof runEndReasons)[number];

/** What is written down during a run. */
export const runEventKinds = [
  'check-in',
  'phase-started',
  'reading',
  'note',
  'disturbance',
  'ended',
] as const;
/** One of {@link runEventKinds}. */
export type RunEventKind = (typeof runEventKinds)[number];

/** Work on the same chambers that is no leakage measurement. */
export const otherWorkKinds = ['cycling', 'ageing', 'other'] as const;
/** One of {@link otherWorkKinds}. */
export type OtherWorkKind = (typeof otherWorkKinds)[number];

/** What falls due on an instrument. */
export const dutyKinds = ['calibration', 'intermediate-check', 'maintenance', 'mapping'] as const;
/** One of {@link dutyKinds}. */
export type DutyKind = (typeof dutyKinds)[number];

/** The life of a calibration record; an approved one is never edited, only replaced. */
export const calibrationStates = [
  'draft',
  'awaiting-approval',
  'approved',
  'refused',
  'replaced',
] as const;
/** One of {@link calibrationStates}. */
export type CalibrationState = (typeof calibrationStates)[number];

/** A certificate's statement of conformity. */
export const conformities = ['conforms', 'does-not-conform', 'not-stated'] as const;
/** One of {@link conformities}. */
export type Conformity = (typeof conformities)[number];

/** The life of a reminder digest. */
export const digestStates = ['waiting', 'sending', 'sent', 'dropped'] as const;
/** One of {@link digestStates}. */
export type DigestState = (typeof digestStates)[number];

/** What a person reads beside an instrument, a channel or a range. */
export const calibrationBadges = [
  'in-date',
  'due-soon',
  'overdue',
  'limited',
  'awaiting-release',
  'out-of-service',
  'not-calibrated',
] as const;
/** One of {@link calibrationBadges}. */
export type CalibrationBadge = (typeof calibrationBadges)[number];

/** The life of a deviation from a rule. */
export const deviationStates = ['asked', 'granted', 'refused', 'expired'] as const;
/** One of {@link deviationStates}. */
export type DeviationState = (typeof deviationStates)[number];
